import type { AnimationFile } from '@slewcurve/formats';
import type { TrackSurveySettings } from '@slewcurve/survey';

/** What a survey of one track is told of the file around it. glTF 2.0 is in metres; the other formats do not say. */
export function placeIn({
  format,
  nodes,
  clips,
}: AnimationFile): Pick<TrackSurveySettings, 'clips' | 'nodes' | 'metres'> {
  return { clips, nodes, ...((format === 'glb' || format === 'gltf') && { metres: 1 }) };
}
