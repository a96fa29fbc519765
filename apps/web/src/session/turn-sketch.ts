import { VALUES_PER_KEY, playAs, replaceTrack, type RotationTrack, type SceneNode } from '@slewcurve/core';
import type { Motion } from '@slewcurve/elements/plot';
import type { TrackAnswer } from '@slewcurve/job';
import { applySteps, type Step } from '@slewcurve/mend';

/**
 * The motion while a key is being turned by hand: the edit itself, done to the key and its two neighbours alone, so that a long take costs no more than a
 * short one. Speeds and odometer are still those before; undefined where it can't be done.
 */
export function turnSketch(
  motion: Motion,
  { after, above }: Omit<TrackAnswer, 'before'>,
  nodes: readonly SceneNode[],
  step: Step,
  key: number,
): Motion | undefined {
  const from = Math.max(0, key - 1);
  const part = keysOf(after, from, Math.min(after.times.length, key + 2));
  try {
    const { tracks } = applySteps([part, ...above], [{ ...step, keys: [key - from] }], nodes);
    const curve = playAs(tracks[0] ?? part, 'as-written');
    return {
      ...motion,
      orientation: (time) =>
        time >= curve.start && time <= curve.end
          ? curve.orientation<[number, number, number, number]>([0, 0, 0, 1], time)
          : motion.orientation(time),
    };
  } catch {
    return undefined;
  }
}

function keysOf(track: RotationTrack, from: number, to: number): RotationTrack {
  const size = VALUES_PER_KEY[track.interpolation];
  return replaceTrack(track, {
    times: track.times.slice(from, to),
    values: track.values.slice(from * size, to * size),
    breaks: track.breaks.filter((key) => key >= from && key < to - 1).map((key) => key - from),
  });
}
