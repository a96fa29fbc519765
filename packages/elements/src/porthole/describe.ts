import type { Motion } from '../chart/motion.js';
import { sayAngle, sayList, sayRate, sayTime } from '../chart/quantity.js';
import { tipOf, type Vector } from './view.js';

/** What the globe shows at a moment, in words: where the two axes point, how fast it turns and about what. */
export function describeMoment(motion: Motion, time: number, noiseFloor: number): string {
  const reading = motion.read(time);
  const orientation = motion.orientation(time);
  const up = tipOf(orientation, [0, 1, 0]);
  const ahead = tipOf(orientation, [0, 0, 1]);
  const moving =
    reading.speed <= noiseFloor
      ? 'it stands still'
      : `it turns at ${sayRate(reading.speed)} about ${sayAxis(tipOf(orientation, unit(reading.own)))}`;
  return `At ${sayTime(reading.time, 2)} own y points ${sayDirection(up)}, own z points ${sayDirection(ahead)}; ${moving}.`;
}

/** A direction in parent axes as azimuth and height: "31° right of ahead, 12° up". Ahead is +z, right is +x, up is +y. */
export function sayDirection(v: Vector): string {
  const height = (Math.atan2(v[1], Math.hypot(v[0], v[2])) * 180) / Math.PI;
  if (Math.abs(height) > 89.5) return height > 0 ? 'straight up' : 'straight down';
  const round = (Math.atan2(v[0], v[2]) * 180) / Math.PI;
  const parts = [];
  if (Math.abs(round) < 0.5) parts.push('ahead');
  else if (Math.abs(round) > 179.5) parts.push('back');
  else parts.push(`${sayAngle(Math.abs(round), 3)} ${round > 0 ? 'right' : 'left'} of ahead`);
  if (Math.abs(height) >= 0.5) parts.push(`${sayAngle(Math.abs(height), 3)} ${height > 0 ? 'up' : 'down'}`);
  return sayList(parts);
}

/** An axis of turning, by what it is closest to, where it is close: "parent y", else its direction. */
function sayAxis(axis: Vector): string {
  const names = ['parent x', 'parent y', 'parent z'];
  const index = [0, 1, 2].find((i) => Math.abs(axis[i]) > 0.9986);
  if (index === undefined) return `an axis that points ${sayDirection(axis)}`;
  return axis[index] < 0 ? `minus ${names[index]}` : names[index];
}

function unit(v: Vector): Vector {
  const size = Math.hypot(...v);
  return size > 0 ? [v[0] / size, v[1] / size, v[2] / size] : [0, 1, 0];
}
