import { SlewcurveError } from '@slewcurve/core';
import type { AnimationFile } from '@slewcurve/formats';
import { guessLoop, surveyTrack, type Finding } from '@slewcurve/survey';
import { cautionsOf } from './cautions.js';
import { clipOnGrid } from './clip-on-grid.js';
import { clipReport } from './clip-report.js';
import { conventionsOf } from './conventions.js';
import { playbackMatrix, type PlaybackMatrix } from './playback-matrix.js';
import type { FileReport, TrackReport } from './report.js';
import type { JobSettings } from './settings.js';
import { trackReport } from './track-report.js';
import { placeIn } from './place-in.js';
import { UNWATCHED, betweenSlices, type Watch } from './watch.js';
import { withEvents } from './with-events.js';

/**
 * Survey every rotation track of an opened file.
 *
 * @param name the file's name as given, forward slashes
 * @throws SlewcurveError `job.stopped`
 */
export async function surveyFile(
  name: string,
  file: AnimationFile,
  settings: JobSettings,
  watch: Watch = UNWATCHED,
): Promise<FileReport> {
  const tracks: TrackReport[] = [];
  const findings: Finding[] = [];
  const clips = file.clips.map((clip) => clipOnGrid(clip, settings.frameRate));
  const matrix: PlaybackMatrix[] = [];
  const total = file.clips.reduce((sum, clip) => sum + clip.tracks.length, 0);
  for (const clip of clips)
    for (const track of clip.tracks) {
      tracks.push(trackReport(track, settings.playbacks[0] ?? 'as-written'));
      if (settings.matrix) matrix.push(playbackMatrix(track, settings.matrix));
      findings.push(...surveyTrack(track, { clip, ...placeIn(file), file: name, ...settings }));
      await betweenSlices(watch, tracks.length, total, 'tracks');
    }
  const cautions = cautionsOf(
    clips.flatMap((clip) => clip.tracks),
    file.nodes,
    settings.houseRules,
  );
  return withEvents({
    file: name,
    status: 'surveyed',
    ...(file.problems.length > 0 && {
      problems: file.problems.map(({ code, level, message }) => ({ code, level, message })),
    }),
    conventions: conventionsOf(file, settings.said),
    clips: clips.map((clip) => {
      const loopGuess = guessLoop(clip, file.nodes, settings.houseRules, name);
      return { ...clipReport(clip), ...(loopGuess !== undefined && { loopGuess }) };
    }),
    tracks,
    ...(cautions.length > 0 && { cautions }),
    findings,
    ...(settings.matrix && { matrix }),
  });
}

/**
 * What is reported of a file that can't be read as its format.
 *
 * @throws what is no `SlewcurveError`: that is a fault of ours
 */
export function unreadableFile(name: string, error: unknown): FileReport {
  if (!(error instanceof SlewcurveError)) throw error;
  const { code, message } = error;
  return { file: name, status: 'unreadable', error: { code, message }, clips: [], tracks: [], findings: [] };
}
