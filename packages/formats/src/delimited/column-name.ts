import type { AngleUnit } from './table-options.js';

/** Seconds in a unit of time as a power of ten. */
export type TimePower = 0 | -3 | -6 | -9;

/** What a column holds, told by its name. `body` is what stands before: `head` of `head_qx`. */
export type ColumnMeaning =
  | { readonly kind: 'time'; readonly power: TimePower | undefined }
  | {
      readonly kind: Family;
      readonly body: string;
      /** Which of the family's numbers, as its letters say. */
      readonly part: string;
      readonly unit: AngleUnit | undefined;
    };

/** Ways to write an orientation. `plain` is a quaternion of x, y, z, w without a q. */
export type Family = 'quaternion' | 'plain' | 'angles' | 'axis' | 'turn' | 'matrix';

const TIME_POWERS: ReadonlyMap<string, TimePower> = new Map([
  ['s', 0],
  ['sec', 0],
  ['seconds', 0],
  ['ms', -3],
  ['us', -6],
  ['µs', -6],
  ['ns', -9],
]);
const ANGLE_UNITS: ReadonlyMap<string, AngleUnit> = new Map([
  ['deg', 'deg'],
  ['degrees', 'deg'],
  ['rad', 'rad'],
  ['radians', 'rad'],
]);

/** A unit at the end: `time_ns`, `timestamp [ns]`, `rx (deg)`. Brackets may stand empty. */
const UNIT = /^(.*?)(?:\s*[[(]\s*([^\])]*?)\s*[\])]|_(s|sec|seconds|ms|us|µs|ns|deg|degrees|rad|radians))$/i;
const TIME = /^(?:t|time|timestamp)$/i;
const FAMILIES: readonly (readonly [Family, RegExp])[] = [
  ['quaternion', /^(?:(.+)[_.\s])?q[_.]?(?:[a-z]+_)?([xyzw])$/i],
  ['angles', /^(?:(.+)[_.\s])?r_?([xyz123])$/i],
  ['axis', /^(?:(.+)[_.\s])?a_?([xyz])$/i],
  ['turn', /^(?:(.+)[_.\s])?(angle)$/i],
  ['matrix', /^(?:(.+)[_.\s])?[mr]_?([0-3])_?([0-3])$/i],
  ['plain', /^(?:(.+)[_.\s])?([xyzw])$/i],
];

/** Longer names are no names; a bound keeps a hostile one from being searched at length. */
const LONGEST_NAME = 256;

/** What a column of this name holds; undefined where the name means no time and no part of an orientation. */
export function meaningOf(name: string): ColumnMeaning | undefined {
  return name.length > LONGEST_NAME ? undefined : meaningOfTrimmed(name.trim());
}

function meaningOfTrimmed(trimmed: string): ColumnMeaning | undefined {
  const [, base = trimmed, bracketed, suffix] = UNIT.exec(trimmed) ?? [];
  const unit = (bracketed ?? suffix ?? '').toLowerCase();
  if (TIME.test(base)) {
    const power = TIME_POWERS.get(unit);
    return unit === '' || power !== undefined ? { kind: 'time', power } : undefined;
  }
  for (const [kind, pattern] of FAMILIES) {
    const parts = pattern.exec(base);
    if (!parts) continue;
    const [, body = '', part = '', column = ''] = parts;
    const angleUnit = ANGLE_UNITS.get(unit);
    if (unit !== '' && angleUnit === undefined) return undefined;
    return { kind, body, part: (part + column).toLowerCase(), unit: angleUnit };
  }
  return undefined;
}
