import {
  PLAYBACKS,
  SlewcurveError,
  angleBetween,
  packed,
  playAs,
  ticked,
  type Curve,
  type PlaybackId,
  type RotationTrack,
  type StorageModel,
  type TickReading,
} from '@slewcurve/core';
import { significant } from '@slewcurve/survey';

/** Ticks a second of screens, cameras and headsets that a matrix looks at where none are named. */
export const USUAL_TICKS: readonly number[] = Object.freeze([24, 30, 60, 120]);

/** What a matrix looks at. */
export interface MatrixSettings {
  /** Ticks a second. */
  readonly ticks: readonly number[];
  /** What programs read at a tick. */
  readonly reading: TickReading;
  /** How programs store the track before they play it; left out: as the file does. */
  readonly storage?: StorageModel;
}

/** One playback at one tick rate. deg/s, degrees, seconds of the file's own clock. */
export interface MatrixCell {
  readonly playback: PlaybackId;
  /** Ticks a second; left out: at every moment, as if there were no ticks. */
  readonly ticks?: number;
  readonly worstRate: number;
  readonly worstRateAt: number;
  /** Largest angle from the file as written, played at every moment. */
  readonly departure: number;
  readonly departureAt: number;
}

/** One track under every playback that can play it, without ticks and at each tick rate. */
export interface PlaybackMatrix {
  readonly clip: string;
  readonly track: string;
  readonly cells: readonly MatrixCell[];
}

const DEGREES = 180 / Math.PI;

/** Worst speed and worst departure of a track by playback and tick rate. Combinations that can't be played have no cell. */
export function playbackMatrix(
  track: RotationTrack,
  { ticks, reading, storage }: MatrixSettings,
): PlaybackMatrix {
  const written = playAs(track, 'as-written');
  const shown = storage === undefined ? track : packed(track, storage);
  const cells = Object.values(PLAYBACKS).flatMap(({ id }) =>
    [undefined, ...ticks].flatMap((rate) => {
      const curve = curveOf(shown, id, rate, reading);
      return curve ? [cellOf(written, curve, id, rate)] : [];
    }),
  );
  return { clip: track.clip, track: track.id, cells };
}

function curveOf(
  track: RotationTrack,
  id: PlaybackId,
  rate: number | undefined,
  reading: TickReading,
): Curve | undefined {
  try {
    return rate === undefined ? playAs(track, id) : ticked(track, id, rate, reading);
  } catch (error) {
    if (error instanceof SlewcurveError) return undefined;
    throw error;
  }
}

function cellOf(written: Curve, curve: Curve, playback: PlaybackId, ticks: number | undefined): MatrixCell {
  const peak = curve.peak(curve.start, curve.end);
  const apart = departureOf(written, curve);
  return {
    playback,
    ...(ticks !== undefined && { ticks }),
    worstRate: significant(peak.rate * DEGREES),
    worstRateAt: peak.time,
    departure: significant(apart.angle * DEGREES),
    departureAt: apart.time,
  };
}

/** At every knot of either curve and just before it, where a held pose is left at once, and at the quarters between each two of the first. */
function departureOf(written: Curve, curve: Curve): { angle: number; time: number } {
  const worst = { angle: 0, time: written.start };
  const [p, q] = [new Float64Array(4), new Float64Array(4)];
  const look = (at: number, time: number = at): void => {
    const angle = angleBetween(written.orientation(p, at), curve.orientation(q, at));
    if (angle > worst.angle) [worst.angle, worst.time] = [angle, time];
  };
  for (const { knots } of [written, curve])
    knots.forEach((time, i) => {
      look(time);
      const before = knots[i - 1];
      if (before !== undefined) look(time - 1e-9 * (time - before), time);
    });
  written.knots.forEach((time, i) => {
    const next = written.knots[i + 1];
    if (next !== undefined) for (const part of [0.25, 0.5, 0.75]) look(time + part * (next - time));
  });
  return worst;
}
