import { bakedTrack, type DemoTrack, type Orientation } from './demo-track.js';
import { panTiltRoll } from './orientation.js';

const RADIANS = Math.PI / 180;
/** Degrees between the satellite's path and the zenith. */
const MISS = 2;
/** Deg/s of the satellite in the sky. */
const SKY_RATE = 1.5;

/**
 * Pan and tilt that point -Z at a satellite: it climbs from 45°, passes 2° beside the zenith at 30 s and sinks to 45°, on a great
 * circle. Near the top the pan has to run at up to 1.5 / sin 2° = 43.0 deg/s.
 */
function pointing(time: number): Orientation {
  const along = SKY_RATE * (time - 30) * RADIANS;
  const x = Math.cos(along) * Math.sin(MISS * RADIANS);
  const y = Math.cos(along) * Math.cos(MISS * RADIANS);
  const z = Math.sin(along);
  const pan = Math.atan2(-x, -z) / RADIANS;
  const tilt = Math.atan2(y, Math.sqrt(x * x + z * z)) / RADIANS;
  return panTiltRoll(pan, tilt);
}

/** The observatory's instrument on its pan-and-tilt mount, 60 s at 25 Hz. */
export function scopeTracks(): readonly DemoTrack[] {
  return [bakedTrack('scope-pass', 'scope', 1500, 25, pointing)];
}
