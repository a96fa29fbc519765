import { PLAYBACKS, type PlaybackId, SlewcurveError, axisChange } from '@slewcurve/core';
import { verbNamed } from './registry.js';
import type { Step } from './step.js';

/** What is wrong with one value; `readKey` adds the step and the key. */
class Fault extends Error {
  readonly code: string;
  constructor(code: string, message: string, cause?: unknown) {
    super(message, { cause });
    this.code = code;
  }
}

/** Every key of a step and how its JSON is read. */
const READERS: { readonly [K in keyof Required<Step>]: (value: unknown) => Partial<Step> } = {
  verb: (value) => ({ verb: text(value) }),
  clip: (value) => ({ clip: text(value) }),
  track: (value) => ({ track: text(value) }),
  keys: (value) => ({ keys: keyNumbers(value) }),
  span: (value) => ({ span: spanOf(value) }),
  shoulders: (value) => ({ shoulders: seconds(value) }),
  keep: (value) => ({ keep: keyNumbers(value) }),
  axis: (value) => {
    const [x, y, z] = finiteNumbers(value, 3);
    if (!(Math.hypot(x, y, z) > 0)) throw new Fault('card.bad-number', 'must have a length');
    return { axis: [x, y, z] };
  },
  turn: (value) => {
    const [x, y, z] = finiteNumbers(value, 3);
    return { turn: [x, y, z] };
  },
  about: (value) => ({ about: oneOf(value, ['own', 'parent', 'world']) }),
  side: (value) => ({ side: oneOf(value, ['own', 'parent']) }),
  fade: (value) => ({ fade: seconds(value) }),
  steps: (value) => {
    if (!isWhole(value) || value < 2) throw new Fault('card.bad-number', 'must be a whole number from 2 up');
    return { steps: value };
  },
  with: (value) => ({ with: oneOf(value, ['node', 'track', 'clip']) }),
  store: (value) => ({ store: oneOf(value, ['move', 'frames', 'cubic']) }),
  ends: (value) => ({ ends: oneOf(value, ['same', 'run', 'go']) }),
  seconds: (value) => ({ seconds: above0(value) }),
  at: (value) => {
    if (!isFiniteNumber(value)) throw new Fault('card.bad-number', 'must be a finite number of seconds');
    return { at: value };
  },
  rate: (value) => ({ rate: above0(value) }),
  acceleration: (value) => ({ acceleration: above0(value) }),
  ease: (value) => ({ ease: text(value) }),
  by: (value) => {
    if (!isFiniteNumber(value)) throw new Fault('card.bad-number', 'must be a finite number of deg/s');
    return { by: value };
  },
  reach: (value) => ({ reach: above0(value) }),
  speeds: (value) => ({ speeds: drawnSpeeds(value) }),
  marks: (value) => ({ marks: pairs(value, 'pairs of times') }),
  sigma: (value) => ({ sigma: above0(value) }),
  grain: (value) => ({ grain: above0(value) }),
  guard: (value) => ({ guard: above0(value) }),
  guards: (value) => ({ guards: pairs(value, 'spans') }),
  hertz: (value) => ({ hertz: above0(value) }),
  spread: (value) => ({ spread: oneOf(value, ['tail', 'evenly']) }),
  anchor: (value) => ({ anchor: oneOf(value, ['start', 'end', 'both']) }),
  corners: (value) => ({ corners: oneOf(value, ['round', 'stop']) }),
  which: (value) => ({ which: oneOf(value, ['in', 'out']) }),
  turns: (value) => {
    if (!Number.isSafeInteger(value) || typeof value !== 'number')
      throw new Fault('card.bad-number', 'must be a whole number');
    return { turns: value };
  },
  fromTrack: (value) => ({ fromTrack: text(value) }),
  fromClip: (value) => ({ fromClip: text(value) }),
  fromSpan: (value) => ({ fromSpan: spanOf(value) }),
  meet: (value) => {
    if (!isFiniteNumber(value) || value < 0)
      throw new Fault('card.bad-number', 'must be a finite number of deg/s, 0 or more');
    return { meet: value };
  },
  axes: (value) => {
    const words = text(value);
    try {
      axisChange(words);
    } catch (error) {
      throw new Fault(
        'card.bad-text',
        error instanceof Error ? error.message : 'must name x, y and z',
        error,
      );
    }
    return { axes: words.trim().replace(/\s+/g, ' ') };
  },
  components: (value) => {
    const letters = text(value);
    if (!/^[xyzw]{4}$/.test(letters) || new Set(letters).size !== 4)
      throw new Fault('card.bad-text', 'must have x, y, z and w once each, as in "wxyz"');
    return { components: letters };
  },
  angles: (value) => ({ angles: oneOf(value, ['degrees', 'radians']) }),
  space: (value) => ({ space: oneOf(value, ['world', 'parent']) }),
  normal: (value) => ({ normal: oneOf(value, ['x', 'y', 'z']) }),
  pairs: (value) => {
    if (!Array.isArray(value) || value.length === 0 || !value.every(isPair))
      throw new Fault('card.bad-text', 'must be a list of pairs of names, neither empty nor alike');
    return { pairs: value.map(([a, b]) => [a, b] as const) };
  },
  interpolation: (value) => ({ interpolation: oneOf(value, ['LINEAR', 'CUBICSPLINE']) }),
  within: (value) => ({ within: above0(value) }),
  fps: (value) => ({ fps: above0(value) }),
  source: (value) => ({ source: above0(value) }),
  playback: (value) => ({ playback: oneOf(value, PLAYBACK_IDS) }),
  tangents: (value) => ({ tangents: oneOf(value, ['in', 'out']) }),
};

const PLAYBACK_IDS: readonly PlaybackId[] = Object.values(PLAYBACKS).map(({ id }) => id);

const EVERY_VERB_READS: readonly (keyof Step)[] = ['verb', 'clip', 'track', 'span', 'shoulders', 'keep'];

/**
 * One step of a job card from parsed JSON of any origin. `index` is its place in the card, from 0; people count from 1.
 *
 * @throws SlewcurveError `card.bad-shape`, `card.unknown-verb`, `card.bad-number`, `card.bad-text`, `card.unknown-key`
 */
export function readStep(json: unknown, index: number): Step {
  const pointer = `/steps/${index}`;
  if (typeof json !== 'object' || json === null || Array.isArray(json))
    throw new SlewcurveError('card.bad-shape', `Step ${index + 1} must be an object.`, { pointer });
  const given = new Map<string, unknown>(Object.entries(json));
  let step: Step = { verb: '', clip: '', track: '' };
  for (const key of ['verb', 'clip', 'track'] as const)
    step = { ...step, ...readKey(key, given.get(key), index) };
  const verb = verbNamed(step.verb, { pointer: `${pointer}/verb` });
  const known = [...EVERY_VERB_READS, ...verb.reads];
  for (const [name, value] of given) {
    const key = known.find((other) => other === name);
    if (key === undefined)
      throw new SlewcurveError(
        'card.unknown-key',
        `Step ${index + 1}: "${verb.name}" reads no "${name.slice(0, 60)}". It reads ${known.join(', ')}.`,
        { pointer: `${pointer}/${name.replaceAll('~', '~0').replaceAll('/', '~1')}` },
      );
    step = { ...step, ...readKey(key, value, index) };
  }
  return step;
}

function readKey(key: keyof Step, value: unknown, index: number): Partial<Step> {
  try {
    return READERS[key](value);
  } catch (error) {
    if (!(error instanceof Fault)) throw error;
    throw new SlewcurveError(
      error.code,
      `Step ${index + 1}: "${key}" ${error.message}; it is ${shown(value)}.`,
      { pointer: `/steps/${index}/${key}` },
      { cause: error },
    );
  }
}

function text(value: unknown): string {
  if (typeof value !== 'string') throw new Fault('card.bad-text', 'must be text');
  return value;
}

function keyNumbers(value: unknown): readonly number[] {
  if (!Array.isArray(value) || value.length === 0 || !value.every(isWhole))
    throw new Fault('card.bad-number', 'must be a list of key numbers, whole and from 0 up');
  return value;
}

function drawnSpeeds(value: unknown): readonly (readonly [number, number])[] {
  const speeds = pairs(value, 'pairs of a time and a speed');
  const ascend = speeds.every(([time], i) => i === 0 || time > speeds[i - 1][0]);
  if (speeds.length < 2 || !ascend || speeds.some(([, speed]) => speed < 0))
    throw new Fault(
      'card.bad-number',
      'must be two points or more, their times ascending and no speed below 0',
    );
  return speeds;
}

function pairs(value: unknown, what: string): (readonly [number, number])[] {
  if (!Array.isArray(value) || value.length === 0)
    throw new Fault('card.bad-number', `must be a list of ${what}`);
  return value.map((pair: unknown) => {
    const [first, second] = finiteNumbers(pair, 2);
    return [first, second] as const;
  });
}

function spanOf(value: unknown): readonly [number, number] {
  const [from, to] = finiteNumbers(value, 2);
  if (from > to) throw new Fault('card.bad-number', 'must not end before it starts');
  return [from, to];
}

function finiteNumbers(value: unknown, count: number): readonly number[] {
  if (!Array.isArray(value) || value.length !== count || !value.every(isFiniteNumber))
    throw new Fault('card.bad-number', `must be a list of ${count} finite numbers`);
  return value;
}

function seconds(value: unknown): number {
  if (!isFiniteNumber(value) || value < 0)
    throw new Fault('card.bad-number', 'must be a finite number of seconds, 0 or more');
  return value;
}

function above0(value: unknown): number {
  if (!isFiniteNumber(value) || !(value > 0))
    throw new Fault('card.bad-number', 'must be a finite number above 0');
  return value;
}

function oneOf<const T extends string>(value: unknown, words: readonly T[]): T {
  const word = words.find((known) => known === value);
  if (word === undefined)
    throw new Fault('card.bad-text', `must be ${words.map((known) => `"${known}"`).join(' or ')}`);
  return word;
}

function isFiniteNumber(value: unknown): value is number {
  return Number.isFinite(value);
}

function isPair(value: unknown): value is readonly [string, string] {
  if (!Array.isArray(value) || value.length !== 2) return false;
  const [a, b]: readonly unknown[] = value;
  return typeof a === 'string' && typeof b === 'string' && a !== '' && b !== '' && a !== b;
}

function isWhole(value: unknown): value is number {
  return isFiniteNumber(value) && Number.isSafeInteger(value) && value >= 0;
}

function shown(value: unknown): string {
  return (JSON.stringify(value) ?? 'missing').slice(0, 60);
}
