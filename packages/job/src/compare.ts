import {
  SlewcurveError,
  angleBetween,
  playAs,
  rateFloor,
  type Curve,
  type PlaybackId,
  type RotationTrack,
} from '@slewcurve/core';
import type { AnimationFile } from '@slewcurve/formats';
import { significant } from '@slewcurve/survey';
import { VERSION } from './version.js';

/** How two tracks of one name differ as played. Degrees, deg/s, seconds of the files' own clocks. */
export interface TrackComparison {
  readonly clip: string;
  readonly track: string;
  /** Largest angle between the two, and when. */
  readonly angle: number;
  readonly angleAt: number;
  /** Largest difference of their mean speeds over one key interval, and which. */
  readonly rate: number;
  readonly rateOver: readonly [number, number];
}

/** A track beyond a limit: by its keys' number, or by what they say. Values in degrees or deg/s. */
export interface ComparisonFinding extends TrackAddress {
  readonly rule: 'keys.too-few' | 'keys.drift';
  readonly level: 'error';
  /** Keys in the first file and in the second. */
  readonly keys: readonly [number, number];
  readonly span: readonly [number, number];
  readonly value: number;
  readonly unit: 'deg' | 'deg/s';
  readonly limit: number;
}

/** A track by name. */
export interface TrackAddress {
  readonly clip: string;
  readonly track: string;
}

/** What `slewcurve compare A B` prints: see the published schema `schema/comparison.json`. */
export interface Comparison {
  readonly schemaVersion: 1;
  readonly tool: { readonly name: 'slewcurve'; readonly version: string };
  readonly a: string;
  readonly b: string;
  readonly playback: PlaybackId;
  /** Looks taken in each stretch between two neighbouring key times of either. */
  readonly looks: number;
  readonly limits: ComparisonLimits;
  /** In the order of the first file. */
  readonly tracks: readonly TrackComparison[];
  /** Tracks beyond a limit, in the same order. */
  readonly findings: readonly ComparisonFinding[];
  readonly onlyInA: readonly TrackAddress[];
  readonly onlyInB: readonly TrackAddress[];
  readonly verdict: 'pass' | 'fail';
}

/** Largest differences that pass, degrees and deg/s; undefined: any. */
export interface ComparisonLimits {
  readonly angle?: number;
  readonly rate?: number;
}

/** A file to compare. */
export interface ComparedFile {
  readonly name: string;
  readonly file: AnimationFile;
}

const DEGREES = 180 / Math.PI;
const LOOKS = 16;

/**
 * How two files differ as one playback plays them, track by track by clip and name. With a limit, a track that only one of them has fails as
 * well.
 *
 * @throws SlewcurveError `compare.unplayable` where the playback can't play a track
 */
export function compareFiles(
  a: ComparedFile,
  b: ComparedFile,
  playback: PlaybackId,
  limits: ComparisonLimits = {},
): Comparison {
  const [inA, inB] = [a, b].map(tracksByName);
  const findings: ComparisonFinding[] = [];
  const pairs = [...(inA ?? [])].flatMap(([name, track]) => {
    const other = inB?.get(name);
    if (!other) return [];
    const compared = compareTracks(track, other, playback);
    findings.push(...beyond(compared, [track.times.length, other.times.length], limits));
    return [compared];
  });
  const onlyInA = missing(inA, inB);
  const onlyInB = missing(inB, inA);
  const limited = limits.angle !== undefined || limits.rate !== undefined;
  return {
    schemaVersion: 1,
    tool: { name: 'slewcurve', version: VERSION },
    a: a.name,
    b: b.name,
    playback,
    looks: LOOKS,
    limits,
    tracks: pairs,
    findings,
    onlyInA,
    onlyInB,
    verdict: findings.length === 0 && (!limited || onlyInA.length + onlyInB.length === 0) ? 'pass' : 'fail',
  };
}

/** What is beyond the limits of a track: its angle, or else its rate. */
function beyond(
  { clip, track, angle, angleAt, rate, rateOver }: TrackComparison,
  keys: readonly [number, number],
  limits: ComparisonLimits,
): ComparisonFinding[] {
  const rule = keys[1] < keys[0] ? 'keys.too-few' : 'keys.drift';
  const told = { rule, level: 'error', clip, track, keys } as const;
  if (limits.angle !== undefined && angle > limits.angle)
    return [{ ...told, span: [angleAt, angleAt], value: angle, unit: 'deg', limit: limits.angle }];
  if (limits.rate !== undefined && rate > limits.rate)
    return [{ ...told, span: rateOver, value: rate, unit: 'deg/s', limit: limits.rate }];
  return [];
}

/** How two tracks differ, each as a playback plays it, one for both where a second is not named; outside its keys a track holds its ends. */
export function compareTracks(
  a: RotationTrack,
  b: RotationTrack,
  playback: PlaybackId,
  playbackOfB: PlaybackId = playback,
): TrackComparison {
  const curves: readonly [Curve, Curve] = [curveOf(a, playback), curveOf(b, playbackOfB)];
  const { angle, angleAt } = largestAngle(curves);
  const { rate, rateOver } = largestRate([a, b], curves);
  return {
    clip: a.clip,
    track: a.id,
    angle: significant(angle * DEGREES),
    angleAt,
    rate: significant(rate * DEGREES),
    rateOver,
  };
}

function largestAngle([p, q]: readonly [Curve, Curve]): { readonly angle: number; readonly angleAt: number } {
  const knots = Float64Array.from(new Set([...p.knots, ...q.knots]));
  knots.sort();
  const [u, v] = [new Float64Array(4), new Float64Array(4)];
  let [angle, angleAt] = [0, knots[0] ?? 0];
  const look = (time: number): void => {
    const between = angleBetween(p.orientation(u, time), q.orientation(v, time));
    if (between > angle) [angle, angleAt] = [between, time];
  };
  for (let i = 0; i + 1 < knots.length; i++) {
    const [from = 0, to = 0] = [knots[i], knots[i + 1]];
    for (let n = 0; n < LOOKS; n++) look(from + ((to - from) * n) / LOOKS);
  }
  look(knots.at(-1) ?? 0);
  return { angle, angleAt };
}

/**
 * Mean speed: angle turned over time, over every key interval that either track stores. Differences below what the storage of both can
 * tell are none.
 */
function largestRate(
  tracks: readonly [RotationTrack, RotationTrack],
  [p, q]: readonly [Curve, Curve],
): { readonly rate: number; readonly rateOver: readonly [number, number] } {
  let rate = 0;
  let rateOver: readonly [number, number] = [p.start, p.start];
  for (const track of tracks)
    for (let key = 0; key + 1 < track.times.length; key++) {
      const [from = 0, to = 0] = [track.times[key], track.times[key + 1]];
      if (!(to > from)) continue;
      const difference = Math.abs(p.length(from, to) - q.length(from, to)) / (to - from);
      if (difference <= rate || difference <= 2 * rateFloor(track, key)) continue;
      rate = difference;
      rateOver = [from, to];
    }
  return { rate, rateOver };
}

function curveOf(track: RotationTrack, playback: PlaybackId): Curve {
  try {
    return playAs(track, playback);
  } catch (cause) {
    if (!(cause instanceof SlewcurveError)) throw cause;
    throw new SlewcurveError(
      'compare.unplayable',
      `${track.id} in ${track.clip} can't be played ${playback.replaceAll('-', ' ')}: ${cause.message}`,
      { clip: track.clip, track: track.id },
      { cause },
    );
  }
}

function tracksByName({ file }: ComparedFile): Map<string, RotationTrack> {
  return new Map(
    file.clips.flatMap((clip) =>
      clip.tracks.map((track) => [JSON.stringify([track.clip, track.id]), track] as const),
    ),
  );
}

function missing(
  from: ReadonlyMap<string, RotationTrack> | undefined,
  other: ReadonlyMap<string, RotationTrack> | undefined,
): TrackAddress[] {
  return [...(from ?? [])].flatMap(([name, { clip, id }]) => (other?.has(name) ? [] : [{ clip, track: id }]));
}
