import type { Clip, SceneNode } from '@slewcurve/core';
import { guessLoop, type HouseRules } from '@slewcurve/survey';
import type { ClipReport } from './report.js';

/** The figures of one clip of a file. */
export function clipReport(
  clip: Clip,
  nodes: readonly SceneNode[],
  houseRules: HouseRules,
  file: string,
): ClipReport {
  const loopGuess = guessLoop(clip, nodes, houseRules, file);
  return {
    clip: clip.name,
    seconds: clip.end - clip.start,
    ...(clip.frameRate !== undefined && { frameRate: clip.frameRate }),
    tracks: clip.tracks.length,
    keys: clip.tracks.reduce((sum, track) => sum + track.times.length, 0),
    ...(loopGuess !== undefined && { loopGuess }),
  };
}
