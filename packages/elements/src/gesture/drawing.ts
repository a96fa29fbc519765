import { sayCount, sayNumber, sayRate, sayTime } from '../chart/quantity.js';
import {
  outToKeys,
  sayable,
  stepsOfKey,
  tidy,
  toRadians,
  type Ground,
  type Hand,
  type Place,
} from './hand.js';
import { fewestPoints } from './fewest-points.js';

/** Places of a drawing, evenly over its span. */
const PLACES = 48;
/** What a drawing may lose where it is told by fewer points, px. */
const LOST = 1.5;
/** Places to either side that a place takes along, when the keyboard raises it. */
const SOFT = 3;

/** A drawing over the chosen span, else over a third of the paper about the cursor; it begins as the speed is. */
export function drawingAt(ground: Ground, time: number, room: number): Hand {
  const { motion } = ground;
  const held = Math.min(motion.end, Math.max(motion.start, time));
  const span = outToKeys(ground, ground.span ?? [held - room / 6, held + room / 6]);
  const step = (span[1] - span[0]) / PLACES;
  const speeds = Array.from({ length: PLACES + 1 }, (_, i) => motion.read(insideOf(span, i * step)).speed);
  return drawing(ground, span, speeds, PLACES / 2, false);
}

/** A drawing through points, as a step tells it. */
export function drawingThrough(
  ground: Ground,
  span: readonly [number, number],
  points: readonly (readonly [number, number])[],
): Hand {
  const step = (span[1] - span[0]) / PLACES;
  const speeds = Array.from({ length: PLACES + 1 }, (_, i) => speedThrough(points, span[0] + i * step));
  return drawing(ground, span, speeds, PLACES / 2, true);
}

function drawing(
  ground: Ground,
  span: readonly [number, number],
  speeds: readonly number[],
  place: number,
  changed: boolean,
): Hand {
  const { motion, pixel } = ground;
  const step = (span[1] - span[0]) / PLACES;
  const timeAt = (i: number): number => span[0] + i * step;
  const points = fewestPoints(
    speeds.map((speed, i) => ({ time: timeAt(i), speed })),
    LOST * pixel.speed,
  ).map(({ time, speed }) => [tidy(time, 1e-3), tidy(speed, pixel.speed)] as const);
  const turned = motion.read(span[1]).odometer - motion.read(span[0]).odometer;
  const area = areaThrough(points);
  const scale = area > 0 ? turned / area : 0;
  const off = Math.max(...speeds.map((speed, i) => Math.abs(speed - speedThrough(points, timeAt(i)))));
  const says = changed
    ? `drawn with ${sayCount(points.length, 'point')}, within ${sayRate(tidy(off, pixel.speed / 10), 2)} of the hand, times ${sayNumber(scale)} to turn as far as before`
    : 'as it is; draw it anew';
  const drawn = (next: readonly number[], at = place): Hand => drawing(ground, span, next, at, true);
  return {
    kind: 'draw',
    time: timeAt(place),
    stands: { speed: speeds[place] },
    gathers: true,
    drawn: speeds.map((speed, i): Place => ({ time: timeAt(i), speed })),
    law:
      changed && area > 0
        ? {
            kind: 'drawn',
            times: points.map(([time], i) =>
              i === 0 ? 0 : i === points.length - 1 ? span[1] - span[0] : time - span[0],
            ),
            speeds: points.map(([, speed]) => toRadians(speed)),
            span,
          }
        : undefined,
    edit: { verb: 'shape', speeds: points, span: sayable(span) },
    label: `Drawn speed at ${sayTime(timeAt(place))}`,
    says,
    tag: changed ? `${sayCount(points.length, 'point')}, ×${sayNumber(scale)}` : '',
    amount: tidy(speeds[place], 0.01),
    dragged: (from: Place, to: Place) => drawn(stroked(speeds, span, from, to)),
    nudged(press) {
      const [across, up] = stepsOfKey(press);
      if (across !== 0)
        return drawing(ground, span, speeds, Math.min(PLACES, Math.max(0, place + across)), changed);
      return up === 0 ? undefined : drawn(raised(speeds, place, up));
    },
  };
}

/** The speeds under a stroke of the hand from one place to the next. */
function stroked(
  speeds: readonly number[],
  [from, to]: readonly [number, number],
  a: Place,
  b: Place,
): readonly number[] {
  const placeOf = (time: number): number => ((time - from) / (to - from)) * PLACES;
  const [left, right] = a.time <= b.time ? [a, b] : [b, a];
  const [first, last] = [Math.round(placeOf(left.time)), Math.round(placeOf(right.time))];
  return speeds.map((speed, i) => {
    if (i < first || i > last) return speed;
    const share = last > first ? (i - first) / (last - first) : 1;
    return Math.max(0, left.speed + share * (right.speed - left.speed));
  });
}

function raised(speeds: readonly number[], place: number, by: number): readonly number[] {
  return speeds.map((speed, i) => {
    const away = Math.abs(i - place) / (SOFT + 1);
    return away >= 1 ? speed : Math.max(0, speed + by * (1 - away * away) ** 2);
  });
}

function areaThrough(points: readonly (readonly [number, number])[]): number {
  let area = 0;
  for (let i = 1; i < points.length; i++)
    area += ((points[i][0] - points[i - 1][0]) * (points[i][1] + points[i - 1][1])) / 2;
  return area;
}

function speedThrough(points: readonly (readonly [number, number])[], time: number): number {
  const after = points.findIndex(([at]) => at >= time);
  if (after <= 0) return (after < 0 ? points[points.length - 1] : points[0])[1];
  const [[t0, v0], [t1, v1]] = [points[after - 1], points[after]];
  return v0 + ((v1 - v0) * (time - t0)) / (t1 - t0);
}

/** Just inside the span, so that its ends read as it is played there. */
function insideOf([from, to]: readonly [number, number], since: number): number {
  return Math.min(to - 1e-6 * (to - from), from + since);
}
