import { PLAYBACKS } from '@slewcurve/core';
import type { Step } from './step.js';

/** A step's keys that a sentence says at its end, one clause each. `verb`, `clip`, `track` and `keys` have places of their own. */
type ClauseKey = Exclude<keyof Step, 'verb' | 'clip' | 'track' | 'keys'>;

/** One clause: how it is said, and how it is read back from the start of what is left of a sentence. */
interface Clause {
  readonly key: ClauseKey;
  say(step: Step): string;
  readonly pattern: RegExp;
  read(groups: readonly string[]): Partial<Step>;
}

const NUMBER = String.raw`(-?\d+(?:\.\d+)?(?:e[+-]?\d+)?)`;
/** A JSON string. */
const TEXT = String.raw`"(?:[^"\\]|\\.)*"`;
/** A name as `sayName` says it. */
const NAME = String.raw`${TEXT}|[^\s",]+`;
const KEYS = String.raw`keys? (\d+(?:, \d+)*(?: and \d+)?)`;

const STORE_WORDS: Readonly<Record<NonNullable<Step['store']>, string>> = {
  move: 'moving its keys',
  frames: 'at the frames',
  cubic: 'as cubics',
};

const ENDS_WORDS: Readonly<Record<NonNullable<Step['ends']>, string>> = {
  same: 'with the same ends',
  run: 'letting time run',
  go: 'letting angle go and re-seating what follows',
};

const WHOSE_AXES: Readonly<Record<NonNullable<Step['about']>, string>> = {
  own: 'its own',
  parent: "its parent's",
  world: "the world's",
};

/** In the order in which a sentence has them. */
export const CLAUSES: readonly Clause[] = [
  {
    key: 'steps',
    say: ({ steps }) => `over ${steps} ${steps === 1 ? 'step' : 'steps'}`,
    pattern: /^, over (\d+) steps?/,
    read: ([steps]) => ({ steps: Number(steps) }),
  },
  {
    key: 'axis',
    say: ({ axis = [0, 0, 0] }) => `turning about (${axis.map(sayNumber).join(', ')}) in its own frame`,
    pattern: new RegExp(String.raw`^, turning about \(${NUMBER}, ${NUMBER}, ${NUMBER}\) in its own frame`),
    read: ([x, y, z]) => ({ axis: [Number(x), Number(y), Number(z)] }),
  },
  {
    key: 'turn',
    say: ({ turn = [0, 0, 0] }) => `of (${turn.map(sayNumber).join(', ')})°`,
    pattern: new RegExp(String.raw`^, of \(${NUMBER}, ${NUMBER}, ${NUMBER}\)°`),
    read: ([x, y, z]) => ({ turn: [Number(x), Number(y), Number(z)] }),
  },
  {
    key: 'about',
    say: ({ about = 'own' }) => `about ${WHOSE_AXES[about]} axes`,
    pattern: /^, about (its own|its parent's|the world's) axes/,
    read: ([whose]) => ({
      about: whose === 'its own' ? 'own' : whose === "its parent's" ? 'parent' : 'world',
    }),
  },
  {
    key: 'side',
    say: ({ side }) => (side === 'own' ? 'on its own side' : "on the parent's side"),
    pattern: /^, on (its own|the parent's) side/,
    read: ([whose]) => ({ side: whose === 'its own' ? 'own' : 'parent' }),
  },
  {
    key: 'fade',
    say: ({ fade = 0 }) => `fading away over ${sayNumber(fade)} s`,
    pattern: new RegExp(`^, fading away over ${NUMBER} s`),
    read: ([fade]) => ({ fade: Number(fade) }),
  },
  {
    key: 'at',
    say: ({ at = 0 }) => `at ${sayNumber(at)} s`,
    pattern: new RegExp(`^, at ${NUMBER} s`),
    read: ([at]) => ({ at: Number(at) }),
  },
  {
    key: 'by',
    say: ({ by = 0 }) => `pressed by ${sayNumber(by)} deg/s`,
    pattern: new RegExp(`^, pressed by ${NUMBER} deg/s`),
    read: ([by]) => ({ by: Number(by) }),
  },
  {
    key: 'reach',
    say: ({ reach = 0 }) => `reaching ${sayNumber(reach)} s`,
    pattern: new RegExp(`^, reaching ${NUMBER} s`),
    read: ([reach]) => ({ reach: Number(reach) }),
  },
  {
    key: 'speeds',
    say: ({ speeds = [] }) =>
      `drawn through ${speeds.map(([time, speed]) => `${sayNumber(speed)} deg/s at ${sayNumber(time)} s`).join(' and ')}`,
    pattern: new RegExp(
      `^, drawn through (${NUMBER} deg/s at ${NUMBER} s(?: and ${NUMBER} deg/s at ${NUMBER} s)*)`,
    ),
    read: ([speeds = '']) => ({ speeds: speeds.split(' and ').map(readDrawn) }),
  },
  {
    key: 'marks',
    say: ({ marks = [] }) =>
      `with ${marks.map(([old, time]) => `${sayNumber(old)} s at ${sayNumber(time)} s`).join(' and ')}`,
    pattern: new RegExp(`^, with (${NUMBER} s at ${NUMBER} s(?: and ${NUMBER} s at ${NUMBER} s)*)`),
    read: ([marks = '']) => ({ marks: marks.split(' and ').map((mark) => readPair(mark, ' at ')) }),
  },
  {
    key: 'turns',
    say: ({ turns }) => `with ${turns} whole ${turns === 1 ? 'turn' : 'turns'} more`,
    pattern: /^, with (-?\d+) whole turns? more/,
    read: ([turns]) => ({ turns: Number(turns) }),
  },
  {
    key: 'fromTrack',
    say: ({ fromTrack = '' }) => `from track ${sayName(fromTrack)}`,
    pattern: new RegExp(`^, from track (${NAME})`),
    read: ([name = '']) => ({ fromTrack: readName(name) }),
  },
  {
    key: 'fromClip',
    say: ({ fromClip = '' }) => `from clip ${sayName(fromClip)}`,
    pattern: new RegExp(`^, from clip (${NAME})`),
    read: ([name = '']) => ({ fromClip: readName(name) }),
  },
  {
    key: 'fromSpan',
    say: ({ fromSpan = [0, 0] }) => `from ${sayNumber(fromSpan[0])} s to ${sayNumber(fromSpan[1])} s there`,
    pattern: new RegExp(`^, from ${NUMBER} s to ${NUMBER} s there`),
    read: ([from, to]) => ({ fromSpan: [Number(from), Number(to)] }),
  },
  {
    key: 'meet',
    say: ({ meet = 0 }) => `meeting at ${sayNumber(meet)} deg/s`,
    pattern: new RegExp(`^, meeting at ${NUMBER} deg/s`),
    read: ([meet]) => ({ meet: Number(meet) }),
  },
  {
    key: 'rate',
    say: ({ rate = 0 }) => `to at most ${sayNumber(rate)} deg/s`,
    pattern: new RegExp(`^, to at most ${NUMBER} deg/s(?!²)`),
    read: ([rate]) => ({ rate: Number(rate) }),
  },
  {
    key: 'acceleration',
    say: ({ acceleration = 0 }) => `to at most ${sayNumber(acceleration)} deg/s²`,
    pattern: new RegExp(`^, to at most ${NUMBER} deg/s²`),
    read: ([acceleration]) => ({ acceleration: Number(acceleration) }),
  },
  {
    key: 'axes',
    say: ({ axes }) => `in axes ${axes}`,
    pattern: /^, in axes (-?[xyz] -?[xyz] -?[xyz])/,
    read: ([axes]) => ({ axes }),
  },
  {
    key: 'components',
    say: ({ components }) => `with components ${components}`,
    pattern: /^, with components ([xyzw]{4})/,
    read: ([components]) => ({ components }),
  },
  {
    key: 'angles',
    say: ({ angles }) => `with angles in ${angles}`,
    pattern: /^, with angles in (degrees|radians)/,
    read: ([angles]) => ({ angles: angles === 'degrees' ? 'degrees' : 'radians' }),
  },
  {
    key: 'space',
    say: ({ space }) => (space === 'world' ? "into the world's space" : "into its parent's space"),
    pattern: /^, into (the world's|its parent's) space/,
    read: ([whose]) => ({ space: whose === "the world's" ? 'world' : 'parent' }),
  },
  {
    key: 'normal',
    say: ({ normal }) => `across ${normal}`,
    pattern: /^, across (x|y|z)(?![^,])/,
    read: ([normal]) => ({ normal: normal === 'x' ? 'x' : normal === 'y' ? 'y' : 'z' }),
  },
  {
    key: 'pairs',
    say: ({ pairs = [] }) =>
      `swapping ${pairs.map((pair) => pair.map((name) => JSON.stringify(name)).join(' with ')).join(' and ')}`,
    pattern: new RegExp(`^, swapping (${TEXT} with ${TEXT}(?: and ${TEXT} with ${TEXT})*)`),
    read: ([pairs = '']) => ({ pairs: readPairs(pairs) }),
  },
  {
    key: 'interpolation',
    say: ({ interpolation }) => `to ${interpolation}`,
    pattern: /^, to (LINEAR|CUBICSPLINE)/,
    read: ([mode]) => ({ interpolation: mode === 'LINEAR' ? 'LINEAR' : 'CUBICSPLINE' }),
  },
  {
    key: 'fps',
    say: ({ fps = 0 }) => `to ${sayNumber(fps)} frames a second`,
    pattern: new RegExp(`^, to ${NUMBER} frames a second`),
    read: ([fps]) => ({ fps: Number(fps) }),
  },
  {
    key: 'source',
    say: ({ source = 0 }) => `from keys at ${sayNumber(source)} frames a second`,
    pattern: new RegExp(`^, from keys at ${NUMBER} frames a second`),
    read: ([source]) => ({ source: Number(source) }),
  },
  {
    key: 'playback',
    say: ({ playback }) => `as played by ${playback}`,
    pattern: new RegExp(`^, as played by (${Object.keys(PLAYBACKS).join('|')})(?![a-z-])`),
    read: ([id]) => ({ playback: Object.values(PLAYBACKS).find((playback) => playback.id === id)?.id }),
  },
  {
    key: 'tangents',
    say: ({ tangents }) => `its ${tangents}-tangents alone`,
    pattern: /^, its (in|out)-tangents alone/,
    read: ([side]) => ({ tangents: side === 'in' ? 'in' : 'out' }),
  },
  {
    key: 'corners',
    say: ({ corners }) => (corners === 'round' ? 'rounding corners' : 'stopping at corners'),
    pattern: /^, (rounding corners|stopping at corners)/,
    read: ([words]) => ({ corners: words === 'rounding corners' ? 'round' : 'stop' }),
  },
  {
    key: 'within',
    say: ({ within = 0 }) => `within ${sayNumber(within)} degrees`,
    pattern: new RegExp(`^, within ${NUMBER} degrees`),
    read: ([within]) => ({ within: Number(within) }),
  },
  {
    key: 'which',
    say: ({ which }) => (which === 'in' ? 'at its start alone' : 'at its end alone'),
    pattern: /^, at its (start|end) alone/,
    read: ([which]) => ({ which: which === 'start' ? 'in' : 'out' }),
  },
  {
    key: 'ease',
    say: ({ ease }) => `by ${JSON.stringify(ease)}`,
    pattern: /^, by ("(?:[^"\\]|\\.)*")/,
    read: ([ease = '""']) => ({ ease: String(JSON.parse(ease)) }),
  },
  {
    key: 'seconds',
    say: ({ seconds = 0 }) => `lasting ${sayNumber(seconds)} s`,
    pattern: new RegExp(`^, lasting ${NUMBER} s`),
    read: ([seconds]) => ({ seconds: Number(seconds) }),
  },
  {
    key: 'hertz',
    say: ({ hertz = 0 }) => `at ${sayNumber(hertz)} Hz`,
    pattern: new RegExp(`^, at ${NUMBER} Hz`),
    read: ([hertz]) => ({ hertz: Number(hertz) }),
  },
  {
    key: 'sigma',
    say: ({ sigma = 0 }) => `averaging with a sigma of ${sayNumber(sigma)} s`,
    pattern: new RegExp(`^, averaging with a sigma of ${NUMBER} s`),
    read: ([sigma]) => ({ sigma: Number(sigma) }),
  },
  {
    key: 'grain',
    say: ({ grain = 0 }) => `down to a grain of ${sayNumber(grain)}°`,
    pattern: new RegExp(`^, down to a grain of ${NUMBER}°`),
    read: ([grain]) => ({ grain: Number(grain) }),
  },
  {
    key: 'guard',
    say: ({ guard = 0 }) => `guarding what turns faster than ${sayNumber(guard)} deg/s`,
    pattern: new RegExp(`^, guarding what turns faster than ${NUMBER} deg/s`),
    read: ([guard]) => ({ guard: Number(guard) }),
  },
  {
    key: 'guards',
    say: ({ guards = [] }) =>
      `guarding ${guards.map(([from, to]) => `${sayNumber(from)} s to ${sayNumber(to)} s`).join(' and ')}`,
    pattern: new RegExp(`^, guarding (${NUMBER} s to ${NUMBER} s(?: and ${NUMBER} s to ${NUMBER} s)*)`),
    read: ([guards = '']) => ({ guards: guards.split(' and ').map((span) => readPair(span, ' to ')) }),
  },
  {
    key: 'spread',
    say: ({ spread }) => (spread === 'evenly' ? 'spread evenly' : 'spread over its tail'),
    pattern: /^, spread (evenly|over its tail)/,
    read: ([how]) => ({ spread: how === 'evenly' ? 'evenly' : 'tail' }),
  },
  {
    key: 'anchor',
    say: ({ anchor = 'start' }) => (anchor === 'both' ? 'holding both its ends' : `holding its ${anchor}`),
    pattern: /^, holding (both its ends|its start|its end)/,
    read: ([which]) => ({
      anchor: which === 'both its ends' ? 'both' : which === 'its start' ? 'start' : 'end',
    }),
  },
  {
    key: 'ends',
    say: ({ ends = 'same' }) => ENDS_WORDS[ends],
    pattern: /^, (with the same ends|letting time run|letting angle go and re-seating what follows)/,
    read: ([words = '']) => ({
      ends: words.startsWith('letting time') ? 'run' : words.startsWith('letting angle') ? 'go' : 'same',
    }),
  },
  {
    key: 'with',
    say: ({ with: whom }) => `taking its ${whom} along`,
    pattern: /^, taking its (node|track|clip) along/,
    read: ([whom]) => ({ with: whom === 'clip' ? 'clip' : whom === 'track' ? 'track' : 'node' }),
  },
  {
    key: 'store',
    say: ({ store = 'move' }) => STORE_WORDS[store],
    pattern: /^, (moving its keys|at the frames|as cubics)/,
    read: ([words]) => ({
      store: words === 'at the frames' ? 'frames' : words === 'as cubics' ? 'cubic' : 'move',
    }),
  },
  {
    key: 'span',
    say: ({ span = [0, 0] }) => `between ${sayNumber(span[0])} s and ${sayNumber(span[1])} s`,
    pattern: new RegExp(`^, between ${NUMBER} s and ${NUMBER} s`),
    read: ([from, to]) => ({ span: [Number(from), Number(to)] }),
  },
  {
    key: 'shoulders',
    say: ({ shoulders = 0 }) => `with shoulders of ${sayNumber(shoulders)} s`,
    pattern: new RegExp(`^, with shoulders of ${NUMBER} s`),
    read: ([shoulders]) => ({ shoulders: Number(shoulders) }),
  },
  {
    key: 'keep',
    say: ({ keep = [] }) => `keeping ${sayKeys(keep)}`,
    pattern: new RegExp(`^, keeping ${KEYS}`),
    read: ([keys = '']) => ({ keep: readKeys(keys) }),
  },
];

/** What follows the opening: the keys acted on. */
export const KEYS_PATTERN: RegExp = new RegExp(`^ (?:(all keys)|${KEYS}) of `);

/** `opening` and the step's own words: "Lift out key 19 of Hips/Spine/Neck in Walk." */
export function sentenceOf(opening: string, step: Step): string {
  const clauses = CLAUSES.filter(({ key }) => step[key] !== undefined).map(
    (clause) => `, ${clause.say(step)}`,
  );
  const keys = step.keys ? sayKeys(step.keys) : 'all keys';
  return `${opening} ${keys} of ${sayName(step.track)} in ${sayName(step.clip)}${clauses.join('')}.`;
}

/** "key 3", "keys 3 and 5", "keys 3, 5 and 9". */
function sayKeys(keys: readonly number[]): string {
  if (keys.length === 1) return `key ${keys[0]}`;
  return `keys ${keys.slice(0, -1).join(', ')} and ${keys.at(-1)}`;
}

/** The other way round: the numbers of "3, 5 and 9". */
export function readKeys(keys: string): number[] {
  return keys.split(/, | and /).map(Number);
}

function readPairs(pairs: string): [string, string][] {
  const names = [...pairs.matchAll(new RegExp(TEXT, 'g'))].map(([name]) => String(JSON.parse(name)));
  return Array.from({ length: names.length / 2 }, (_, i) => [names[2 * i], names[2 * i + 1]]);
}

function readDrawn(point: string): readonly [number, number] {
  const [speed, time] = point.split(' at ').map((number) => Number(number.replace(/ (?:deg\/)?s$/, '')));
  return [time, speed];
}

function readPair(pair: string, between: string): readonly [number, number] {
  const [first, second] = pair.split(between).map((seconds) => Number(seconds.replace(/ s$/, '')));
  return [first, second];
}

/** A name as it is, or as a JSON string where white space, a comma, a quote or a last full stop would make it unclear. */
function sayName(name: string): string {
  return /^[^\s",\p{C}]*[^\s",.\p{C}]$/u.test(name) ? name : JSON.stringify(name);
}

function readName(name: string): string {
  return name.startsWith('"') ? String(JSON.parse(name)) : name;
}

function sayNumber(value: number): string {
  return Object.is(value, -0) ? '-0' : String(value);
}
