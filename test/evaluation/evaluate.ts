import { expMap, multiply, rotationTrack, type RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, surveyTrack, type Finding } from '@slewcurve/survey';
import { seededRandom } from '../support/seeded-random.js';
import { MOTION_KINDS, SECONDS, type MotionKind } from './motion-kinds.js';

export const RATES = [24, 30, 60, 120] as const;
const CLEAN_RUNS = 40;
const FAULT_RUNS = 100;
const RADIANS = Math.PI / 180;
const SETTINGS = { houseRules: { ...NO_HOUSE_RULES, roles: { '*': 'joint' } } } as const;
type Random = () => number;
type Vector = [number, number, number];

/** Tracks of 40 clean ones with a lone key and with a shelf, by kind and rate. */
export interface FalseAlarms {
  readonly kind: MotionKind;
  readonly rate: number;
  readonly loneKeys: number;
  readonly shelves: number;
  readonly others: number;
}

/** Planted faults of 100 that were named at their key. */
export interface Found {
  readonly kind: MotionKind;
  readonly rate: number;
  readonly fault: 'lone key' | 'shelf';
  readonly degrees: number;
  readonly found: number;
}

export function falseAlarms(): FalseAlarms[] {
  return MOTION_KINDS.flatMap((kind, i) =>
    RATES.map((rate) => {
      const tracks = Array.from({ length: CLEAN_RUNS }, (_, run) =>
        jumps(trackOf(kind, rate, seedOf(i, rate, run))),
      );
      const having = (test: (rule: string) => boolean): number =>
        tracks.filter((findings) => findings.some(({ rule }) => test(rule))).length;
      return {
        kind,
        rate,
        loneKeys: having((rule) => rule === 'jump.lone-key'),
        shelves: having((rule) => rule === 'jump.shelf'),
        others: having((rule) => rule !== 'jump.lone-key' && rule !== 'jump.shelf'),
      };
    }),
  );
}

/** Faults of a size, planted at random keys of the first two seconds on, about random axes. */
export function planted(
  fault: Found['fault'],
  degrees: number,
  rates: readonly number[],
  names: readonly RegExp[],
): Found[] {
  return MOTION_KINDS.flatMap((kind, i) =>
    names.some((name) => name.test(kind.name))
      ? rates.map((rate) => ({ kind, rate, fault, degrees, found: foundOf(kind, i, rate, fault, degrees) }))
      : [],
  );
}

function foundOf(kind: MotionKind, i: number, rate: number, fault: Found['fault'], degrees: number): number {
  let found = 0;
  for (let run = 0; run < FAULT_RUNS; run++) {
    const random = seededRandom(seedOf(i, rate, run) + 1);
    const track = trackOf(kind, rate, seedOf(i, rate, run));
    const key = Math.round(rate * (1 + 2 * random()));
    const turn = expMap(new Float64Array(4), scaled(direction(random), degrees));
    const keys = fault === 'lone key' ? [key] : [...track.times.keys()].slice(key);
    const findings = jumps(turned(track, keys, turn));
    const rule = fault === 'lone key' ? 'jump.lone-key' : 'jump.shelf';
    if (findings.some((one) => one.rule === rule && one.occurrences.some(({ keys: [at] }) => at === key)))
      found++;
  }
  return found;
}

function seedOf(kind: number, rate: number, run: number): number {
  return 1e6 * (kind + 1) + 1e3 * rate + 2 * run;
}

function jumps(track: RotationTrack): Finding[] {
  return surveyTrack(track, SETTINGS).filter(({ rule }) => rule.startsWith('jump.'));
}

/** One motion of a kind about a random axis, over a slow sway of 2° about three, in float32. */
function trackOf(kind: MotionKind, rate: number, seed: number): RotationTrack {
  const random = seededRandom(seed);
  const axis = direction(random);
  const angle = kind.of(random, rate);
  const phase = 2 * Math.PI * random();
  const times = Array.from({ length: SECONDS * rate + 1 }, (_, key) => key / rate);
  let before: Float64Array | undefined;
  const values = times.flatMap((time) => {
    const main = expMap(new Float64Array(4), scaled(axis, angle(time)));
    const [a, b, c] = [0.23, 0.31, 0.17].map((hertz) => 2 * Math.sin(2 * Math.PI * hertz * time + phase));
    const pose = multiply(main, expMap(new Float64Array(4), scaled([a, b, c], 1)), main);
    const along = before?.reduce((sum, part, i) => sum + part * pose[i], 0) ?? 1;
    before = pose.map((part) => (along < 0 ? -part : part));
    return [...before].map(Math.fround);
  });
  const storage = { component: 'float32', timeComponent: 'float32' } as const;
  return rotationTrack({ times: times.map(Math.fround), values, storage, id: 'Joint', clip: kind.name });
}

function turned(track: RotationTrack, keys: readonly number[], turn: Float64Array): RotationTrack {
  const values = Float64Array.from(track.values);
  for (const key of keys) {
    const pose = values.slice(4 * key, 4 * key + 4);
    values.set(multiply(pose, pose, turn).map(Math.fround), 4 * key);
  }
  return rotationTrack({ ...track, values });
}

/** Evenly spread over the sphere. */
function direction(random: Random): Vector {
  const z = 2 * random() - 1;
  const turn = 2 * Math.PI * random();
  const flat = Math.sqrt(1 - z * z);
  return [flat * Math.cos(turn), flat * Math.sin(turn), z];
}

function scaled([x, y, z]: Vector, degrees: number): Vector {
  return [x * degrees * RADIANS, y * degrees * RADIANS, z * degrees * RADIANS];
}
