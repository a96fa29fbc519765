import { angleBetween, type Curve } from '@slewcurve/core';
import { buildPyramid, queryPyramid, type Pyramid } from './pyramid.js';
import { toDegrees } from './quantity.js';

/** Speeds of equal columns of time, deg/s. */
export interface SpeedColumns {
  readonly greatest: Float32Array;
  readonly least: Float32Array;
}

/** What is true at one moment. Degrees, deg/s, seconds. */
export interface Reading {
  readonly time: number;
  readonly speed: number;
  /** About the thing's own axes, signed, deg/s. */
  readonly own: readonly [number, number, number];
  /** Angle turned since the start, degrees. */
  readonly odometer: number;
}

/** What the chart draws: a motion as a worker or a curve can tell it. */
export interface Motion {
  readonly start: number;
  readonly end: number;
  /** Greatest and least speed in `count` equal columns of `[from, to]`; 0 outside the motion. */
  columns(from: number, to: number, count: number): SpeedColumns;
  /** Exact numbers at a moment; held to the motion's ends. */
  read(time: number): Reading;
  /** Measures ahead what drawing will ask for, for some milliseconds; true where nothing is left to measure. */
  prepare(milliseconds: number): boolean;
  /** Own to parent, `[x, y, z, w]`. */
  orientation(time: number): readonly [number, number, number, number];
}

/** Segments measured between two looks at the clock. */
const MEASURED_AT_ONCE = 256;

/** A column over this many segments is drawn of whole ones. */
const MANY_SEGMENTS = 4;

/**
 * The motion of a curve. Greatest speeds are exact (`Curve.peak`); least speeds are read at both ends and the middle of a
 * stretch. Segments are measured once, when first asked for, and kept in a pyramid.
 */
export function curveMotion(curve: Curve): Motion {
  let pyramid: Pyramid | undefined;
  const scratch: [number, number, number, number] = [0, 0, 0, 1];
  const knots = curve.knots;
  const stretch = (from: number, to: number): [number, number] => extremesWithin(curve, from, to, scratch);
  const tops = new Float32Array(Math.max(0, knots.length - 1));
  const bottoms = new Float32Array(tops.length);
  /** Degrees turned at each knot: the odometer is read at every row and every move of the cursor. */
  const turned = new Float64Array(tops.length + 1);
  let measured = 0;
  const measure = (until: number): void => {
    for (; measured < until; measured++) {
      const [from, to] = [knots[measured], knots[measured + 1]];
      [tops[measured], bottoms[measured]] = stretch(from, to);
      turned[measured + 1] = turned[measured] + toDegrees(curve.length(from, to));
    }
  };
  const odometer = (time: number): number => {
    if (tops.length === 0) return 0;
    const segment = segmentAt(knots, time);
    measure(segment);
    return turned[segment] + toDegrees(curve.length(knots[segment], time));
  };
  const segments = (): Pyramid => {
    measure(tops.length);
    return (pyramid ??= buildPyramid(tops, bottoms));
  };
  return {
    start: curve.start,
    end: curve.end,
    columns(from, to, count) {
      const columns = { greatest: new Float32Array(count), least: new Float32Array(count) };
      const width = (to - from) / count;
      for (let i = 0; i < count; i++) {
        const a = Math.max(curve.start, from + i * width);
        const b = Math.min(curve.end, from + (i + 1) * width);
        if (b < a || knots.length < 2) continue;
        const first = segmentAt(knots, a);
        const last = segmentAt(knots, b);
        if (last - first >= MANY_SEGMENTS) {
          // Neighbours share the segment that their border falls in: less than a quarter of a column, and no spike is lost.
          const whole = queryPyramid(segments(), first, last);
          [columns.greatest[i], columns.least[i]] = [whole.greatest, whole.least];
          continue;
        }
        let [greatest, least] = stretch(a, Math.min(b, knots[first + 1]));
        const take = (top: number, bottom: number): void => {
          greatest = Math.max(greatest, top);
          least = Math.min(least, bottom);
        };
        if (last > first) take(...stretch(knots[last], b));
        if (last > first + 1) {
          const inner = queryPyramid(segments(), first + 1, last - 1);
          take(inner.greatest, inner.least);
        }
        columns.greatest[i] = greatest;
        columns.least[i] = least;
      }
      return columns;
    },
    read(time) {
      const t = Math.min(curve.end, Math.max(curve.start, time));
      curve.rate(scratch, t, 'own');
      const own: [number, number, number] = [
        toDegrees(scratch[0]),
        toDegrees(scratch[1]),
        toDegrees(scratch[2]),
      ];
      return { time: t, speed: Math.hypot(...own), own, odometer: odometer(t) };
    },
    prepare(milliseconds) {
      const end = performance.now() + milliseconds;
      while (measured < tops.length && performance.now() < end)
        measure(Math.min(tops.length, measured + MEASURED_AT_ONCE));
      if (performance.now() >= end) return pyramid !== undefined;
      segments();
      return true;
    },
    orientation: (time) => curve.orientation<[number, number, number, number]>([0, 0, 0, 1], time),
  };
}

/** Greatest angle between two motions in each of `count` columns of `[from, to]`, degrees; read at `reads` moments a column. */
export function differenceColumns(
  a: Motion,
  b: Motion,
  from: number,
  to: number,
  count: number,
  reads = 2,
): Float32Array {
  const out = new Float32Array(count);
  const step = (to - from) / count / reads;
  for (let i = 0; i < count * reads; i++) {
    const t = from + (i + 0.5) * step;
    if (t < Math.min(a.start, b.start) || t > Math.max(a.end, b.end)) continue;
    const apart = toDegrees(angleBetween(a.orientation(t), b.orientation(t)));
    const column = Math.floor(i / reads);
    out[column] = Math.max(out[column], apart);
  }
  return out;
}

/** Number of the segment that holds `time`; the later one at a knot, the last at the end. */
export function segmentAt(knots: ArrayLike<number>, time: number): number {
  let low = 0;
  let high = knots.length - 2;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (knots[middle] <= time) low = middle;
    else high = middle - 1;
  }
  return low;
}

/** Greatest and least speed between two moments, deg/s. */
function extremesWithin(
  curve: Curve,
  from: number,
  to: number,
  scratch: [number, number, number, number],
): [number, number] {
  const greatest = toDegrees(curve.peak(from, to).rate);
  let least = greatest;
  for (const t of [from, (from + to) / 2, to]) least = Math.min(least, speedAt(curve, t, scratch));
  return [greatest, least];
}

function speedAt(curve: Curve, time: number, scratch: [number, number, number, number]): number {
  curve.rate(scratch, time, 'own');
  return toDegrees(Math.hypot(scratch[0], scratch[1], scratch[2]));
}
