import { angleBetween } from '@slewcurve/core';
import { median } from '../../median.js';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { segmentsOf, type Segments } from '../../segments.js';
import { smoothing } from '../shake/smoothing.js';

const DEGREES = 180 / Math.PI;
/** Seconds on each side over which the track's true speed is judged. */
const AROUND = 0.25;
/** Degrees: no turn at all, but for the rounding of a product. */
const STILL = 1e-9;

/** Values stored in too few bits for the motion. */
export const coarse: Rule = Object.freeze({
  id: 'file.coarse',
  family: 'file',
  level: 'warning',
  unit: '%',
  alsoCalled: ['staircase', 'quantised', 'quantized', 'too few bits', '8 bit', 'stepping', 'compression'],
  summary: 'The stored numbers lie on so coarse a lattice that slow turns become a staircase.',
  limits: everyRole({ still: 5, noise: 20, moving: 2 }),
  reads: 'track',
  untouched: 'what turns faster than 60 deg/s; no key turns by more than the lattice is good to',
  find(context: TrackContext, limits: Limits): readonly Place[] {
    const { times, storage } = context.track;
    const { lattice = 0 } = storage;
    if (lattice === 0 || context.played.every(({ holds }) => holds)) return [];
    const { still, noise } = sharesOf(context, limits['moving'] ?? 0, lattice);
    const { still: mostStill = 0, noise: mostNoise = 0 } = limits;
    const isStill = still > mostStill;
    if (!(isStill || noise > mostNoise)) return [];
    const [start, end] = [times[0] ?? 0, times.at(-1) ?? 0];
    return [
      {
        keys: [],
        time: start,
        span: [start, end],
        value: isStill ? still : noise,
        limit: isStill ? mostStill : mostNoise,
        level: 'warning',
        facts: { isStill: Number(isStill), floor: 2 * lattice * DEGREES },
      },
    ];
  },
  remedy(context: TrackContext, { facts }: Place): Remedy | undefined {
    // Whole numbers and text would be rounded to the lattice again.
    const { component } = context.track.storage;
    const holdsMore = component === 'float32' || component === 'float64';
    return holdsMore ? smoothing(context, facts?.['floor'] ?? 0) : undefined;
  },
  message({ value, limit, facts }: Place): string {
    const what =
      facts?.['isStill'] === 1
        ? 'of its steps read zero while it moves'
        : 'of its usual speed is noise of the storage';
    return `the values lie on a lattice that is good to ${sayDegrees(facts?.['floor'] ?? 0)}: ${value.toFixed(0)} % ${what} (limit ${limit} %)`;
  },
  page: {
    what: 'Rotations packed into 8 or 10 bits a number, or written with two or three decimals, for a motion that needs more.',
    trace: 'A comb: zero for some keys, then a spike, where a slow turn should be.',
    standard:
      'glTF 2.0 allows normalised bytes and shorts for rotations; a byte is good to 0.9°, a short to 0.0035°.',
    programs: 'All play what is stored.',
    people:
      'Slow turns that tick. On a motorised head every tick is a blow, and in a headset the world shivers.',
    test: 'All components of a track of 50 keys or more lie on one lattice, coarser than 1e-5; and of the steps taken while the track moves faster than 2 deg/s, over a quarter of a second on each side, more than 5 % read zero, or the lattice’s own noise of speed (√2 steps a key gap) is above 20 % of the median speed. Then no freeze and nothing of the families shake and pace is claimed of the track.',
    source:
      'The bounds of storage are arithmetic; the shares are common practice, no source. A vane stored in bytes read zero in 75 % of its moving steps and was up to 0.49° off (measured).',
    spares: 'Tracks that stand still, sparse tracks of a few poses, STEP tracks.',
    remedy:
      'Export again from the source in shorts or floats. Where the file itself stores floats, `smooth` guesses at what is lost, and turns no key by more than the lattice is good to.',
  },
});

/** Per cent of moving steps that read zero, and what the lattice adds to a step, in per cent of the median moving speed. */
function sharesOf(
  context: TrackContext,
  moving: number,
  lattice: number,
): { readonly still: number; readonly noise: number } {
  const { times } = context.track;
  const segments = segmentsOf(context);
  const { turns } = segments;
  const gap = (times.at(-1) ?? 0) - (times[0] ?? 0);
  const reach = Math.max(1, Math.round((AROUND * turns.length) / gap));
  const speeds: number[] = [];
  let zero = 0;
  for (let k = 0; k < turns.length; k++) {
    const [from, to] = [Math.max(0, k - reach), Math.min(turns.length, k + 1 + reach)];
    const speed = turned(segments, from, to) / ((times[to] ?? 0) - (times[from] ?? 0));
    if (!(speed > moving)) continue;
    speeds.push(speed);
    if ((turns[k] ?? 0) < STILL) zero++;
  }
  if (speeds.length === 0) return { still: 0, noise: 0 };
  const noise = (Math.SQRT2 * lattice * DEGREES * turns.length) / gap;
  return { still: (100 * zero) / speeds.length, noise: (100 * noise) / median(speeds) };
}

function turned({ orientations }: Segments, from: number, to: number): number {
  const before = orientations.subarray(4 * from, 4 * from + 4);
  return angleBetween(before, orientations.subarray(4 * to, 4 * to + 4)) * DEGREES;
}
