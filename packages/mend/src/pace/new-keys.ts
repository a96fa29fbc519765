import {
  type PacedCurve,
  type RotationTrack,
  SlewcurveError,
  type Span,
  findSegment,
  frameGrid,
  medianGap,
} from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { cubicPlaces } from './cubic-places.js';

/** A key of the re-timed track: an old one that travels, or one that is read off the path. */
export interface NewKey {
  readonly time: number;
  /** The old key, where it is one. */
  readonly old?: number;
  /** The old key that it stands for, where that one's corner was rounded off. */
  readonly for?: number;
}

/** Frames per second where keys lie on no grid. Common practice, no source. */
const FRAME_RATE = 30;

/** More keys than this are a slip, and would fill the memory: a day at 100 Hz. */
const MOST_FRAMES = 1e7;

/** Nearer than this share of a frame to a key that travels there is no frame beside it. */
const APART = 0.25;

/** All old keys, at their new times. */
export function movedKeys(track: RotationTrack, { retiming }: Pick<PacedCurve, 'retiming'>): NewKey[] {
  return Array.from(track.times, (time, old) => ({ time: stored(track, retiming.newTime(time)), old }));
}

/** Every frame of a span, and the old keys outside it and at its ends; of those inside it both of a cut, the ones in `keep`, and on sparse tracks all. */
export function frameKeys(
  track: RotationTrack,
  [from, to]: Span,
  paced: Pick<PacedCurve, 'retiming'>,
  isDense: boolean,
  keep: readonly number[] = [],
): NewKey[] {
  const kept = new Set(keep);
  const moved = movedKeys(track, paced).filter(({ old = 0 }) => {
    const time = track.times[old];
    const isCut = track.breaks.includes(old) || track.breaks.includes(old - 1);
    return time <= from || time >= to || !isDense || isCut || kept.has(old);
  });
  const [begin, end] = [paced.retiming.newTime(from), paced.retiming.newTime(to)];
  const frames = isDense ? denseFrames(track, from, to, end) : evenFrames(track, begin, end);
  const gap = isDense ? medianGap(track) : 1 / (frameGrid([track.times]) ?? FRAME_RATE);
  const all: NewKey[] = [...moved];
  for (const time of frames) {
    const at = stored(track, time);
    const isFree = moved.every((key) => Math.abs(key.time - at) > APART * gap);
    // Before a cut nothing turns, and a key there would be one to interpolate from.
    const isHeld = track.breaks.includes(findSegment(track.times, paced.retiming.oldTime(at)));
    if (at > begin && at < end && isFree && !isHeld) all.push({ time: at });
  }
  return ascending(all);
}

/** The same keys, but read off the path where an old one's corner was rounded off. */
export function offCorners(keys: readonly NewKey[], rounded: readonly number[]): NewKey[] {
  const off = new Set(rounded);
  return keys.map((key) =>
    key.old !== undefined && off.has(key.old) ? { time: key.time, for: key.old } : key,
  );
}

function ascending(keys: NewKey[]): NewKey[] {
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  return keys.sort((a, b) => a.time - b.time);
}

/** How near a cubic is kept to the wanted curve, radians: 0.0005°, which over a tenth of a second is 0.02 deg/s of ripple. */
const NEAR = 0.0005 * (Math.PI / 180);

/** All old keys at their new times, the places in the span where the pace changes its kind, and as many between as cubics need. */
export function cubicKeys(track: RotationTrack, [from, to]: Span, paced: PacedCurve): NewKey[] {
  const moved = movedKeys(track, paced);
  const [begin, end] = [paced.retiming.newTime(from), paced.retiming.newTime(to)];
  const apart = 1e-4 * (end - begin);
  const isFree = (time: number): boolean => moved.every((key) => Math.abs(key.time - time) > apart);
  const turns = Array.from(paced.retiming.knots)
    .filter((time) => time > begin && time < end && isFree(time))
    .map((time): NewKey => ({ time: stored(track, time) }));
  const posts = ascending([...moved, ...turns]);
  const between = posts.slice(1).flatMap(({ time }, i) => {
    const before = posts[i].time;
    const isHeld = track.breaks.includes(
      findSegment(track.times, paced.retiming.oldTime((before + time) / 2)),
    );
    if (before < begin || time > end || isHeld) return [];
    return cubicPlaces(paced, before, time, NEAR).map((at): NewKey => ({ time: stored(track, at) }));
  });
  return ascending([...posts, ...between]);
}

/** The old key times, and after them more at the same distance. */
function denseFrames(track: RotationTrack, from: number, to: number, end: number): number[] {
  const { times } = track;
  const frames = Array.from(times.filter((time) => time > from && time <= to));
  const gap = (to - from) / Math.max(1, frames.length);
  checkCount(track, (end - to) / gap);
  for (let n = 1; to + n * gap < end; n++) frames.push(to + n * gap);
  return frames;
}

/** @throws SlewcurveError `step.too-long` */
function checkCount(track: RotationTrack, frames: number): void {
  if (frames <= MOST_FRAMES) return;
  throw new SlewcurveError(
    'step.too-long',
    `It would take ${frames.toPrecision(3)} frames, more than ${MOST_FRAMES}. Ask for a higher speed, or less time.`,
    placeOf(track),
  );
}

function evenFrames(track: RotationTrack, begin: number, end: number): number[] {
  const { times } = track;
  const rate = frameGrid([times]) ?? FRAME_RATE;
  checkCount(track, (end - begin) * rate);
  const frames: number[] = [];
  for (let n = Math.ceil((begin - times[0]) * rate); times[0] + n / rate < end; n++)
    frames.push(times[0] + n / rate);
  return frames;
}

/** A time as the track's storage holds it. */
export function stored({ storage }: RotationTrack, time: number): number {
  return storage.timeComponent === 'float32' ? Math.fround(time) : time;
}
