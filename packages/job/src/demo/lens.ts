import { bakedTrack, type DemoTrack, type Orientation } from './demo-track.js';
import { turnAbout } from './orientation.js';

const NODE = 'lens';
/** Three turns in 30 s. */
const RATE = 36;

/** Degrees by which the six half turns of `lens-halves` miss: steps of 179.8, 180.4, 179.7, 180.3, 179.9, 179.9. */
const SLOP = [0, -0.2, 0.2, -0.1, 0.2, 0.1, 0];

/** The lighthouse's lens, which turns evenly about the vertical, stored in three ways. */
export function lensTracks(): readonly DemoTrack[] {
  return [
    // A key each third of a turn: sound.
    bakedTrack('lens-thirds', NODE, 10, 0.3, (_, key) => turned(120 * key)),
    // A key each half turn, give or take: the direction is lost, two of six run backwards.
    bakedTrack('lens-halves', NODE, 7, 0.2, (_, key) => turned(180 * key + (SLOP[key] ?? 0))),
    // Baked at 10 Hz as a loop whose last key repeats the one before instead of the first.
    bakedTrack('lens-doubled-end', NODE, 301, 10, (time, key) => turned(RATE * (key === 300 ? 29.9 : time))),
  ];
}

/** About the vertical. */
function turned(degrees: number): Orientation {
  return turnAbout([0, 1, 0], degrees);
}
