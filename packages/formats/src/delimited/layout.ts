import { eulerSequence, SlewcurveError, type EulerSequence } from '@slewcurve/core';
import type { LinePlace } from '../text/text-fault.js';
import { type ColumnMeaning, type Family, meaningOf, type TimePower } from './column-name.js';
import type { AngleUnit, TableOptions } from './table-options.js';

/** How a body's orientation is written. */
export type Form =
  | { readonly kind: 'quaternion' }
  | {
      readonly kind: 'angles';
      readonly sequence: EulerSequence;
      /** Which of the three angles each column holds; the others are 0. */
      readonly parts: readonly number[];
      readonly unit: AngleUnit;
    }
  | { readonly kind: 'axis-angle'; readonly unit: AngleUnit }
  | { readonly kind: 'matrix' };

/** One thing that turns, and where its numbers stand. */
export interface Body {
  readonly name: string;
  readonly form: Form;
  /** quaternion: x, y, z, w; axis-angle: x, y, z, angle; matrix: nine, columns first; angles: as `parts`. */
  readonly columns: readonly number[];
}

/** What every column of a table holds. */
export interface Layout {
  readonly time: number;
  /** Undefined: seconds, by a name that does not say so. */
  readonly timePower: TimePower | undefined;
  readonly bodies: readonly Body[];
  /** Bodies whose orientation stands in more than one form; the first is read. */
  readonly doubled: readonly string[];
}

type BodyForm = Omit<Body, 'name'>;

type Found = ReadonlyMap<string, { readonly column: number; readonly unit: AngleUnit | undefined }>;

const QUATERNION = ['x', 'y', 'z', 'w'];

/**
 * The layout that a table's column names tell. Nothing is guessed: components go by their names, not by their places.
 *
 * @param where the line that names the columns, undefined where the options do
 * @throws SlewcurveError `delimited.unnamed-columns`, which says what is missing; `delimited.doubled-column`;
 *   `delimited.unit-conflict`; `euler.unknown-sequence`
 */
export function layoutOf(
  file: string,
  names: readonly string[],
  options: TableOptions,
  where: LinePlace | undefined,
): Layout {
  const place = { file, ...(where && { line: where.number, byte: where.at }) };
  const meanings = names.map(meaningOf);
  const missing: string[] = [];
  const time = timeOf(meanings, names, place);
  if (!time) missing.push('the time (t, time or timestamp, with _s, _ms, _us or _ns)');
  const bodies: Body[] = [];
  const doubledForms: string[] = [];
  let begun = 0;
  for (const [name, families] of familiesOf(meanings, names, place)) {
    const { form, more } = formOf(families, options, missing, place);
    if (form) bodies.push({ name, ...form });
    if (more) doubledForms.push(name);
    begun = missing.length - (time ? 0 : 1);
  }
  if (bodies.length === 0 && begun === 0)
    missing.push(
      'an orientation (qx qy qz qw; x y z w; rx ry rz with _deg or _rad; ax ay az angle; m00 to m22)',
    );
  if (!time || missing.length > 0) throw unnamed(file, names, missing, place);
  return { time: time.column, timePower: time.power, bodies, doubled: doubledForms };
}

function timeOf(
  meanings: readonly (ColumnMeaning | undefined)[],
  names: readonly string[],
  place: Place,
): { readonly column: number; readonly power: TimePower | undefined } | undefined {
  const times = meanings.flatMap((meaning, column) =>
    meaning?.kind === 'time' ? [{ column, power: meaning.power }] : [],
  );
  if (times.length > 1) throw doubled(names[times[1]?.column ?? 0] ?? '', place);
  return times[0];
}

type Place = { readonly file: string; readonly line?: number };

/** @throws SlewcurveError `delimited.unnamed-columns` of a table that names nothing at all */
export function refuseUnnamed(file: string, cells: number, line: LinePlace): never {
  throw new SlewcurveError(
    'delimited.unnamed-columns',
    `${file}, line ${line.number}: the rows have ${cells} columns and no header names them, so which is the time and which is x, y, z or w is not known. ${HOW}`,
    { file, line: line.number, byte: line.at },
  );
}

const HOW =
  'Name the columns in a header or by --columns timestamp,tx,ty,tz,qx,qy,qz,qw; angles also by --euler YXZ and --unit deg or rad.';

function unnamed(
  file: string,
  names: readonly string[],
  missing: readonly string[],
  place: Place,
): SlewcurveError {
  const line = place.line === undefined ? '' : `, line ${place.line}`;
  const listed = names.slice(0, 16).map((name) => name.trim().slice(0, 24));
  return new SlewcurveError(
    'delimited.unnamed-columns',
    `${file}${line}: the columns ${listed.join(', ')} leave out ${missing.join(' and ')}. ${HOW}`,
    place,
  );
}

function doubled(name: string, place: Place): SlewcurveError {
  return new SlewcurveError(
    'delimited.doubled-column',
    `${place.file}: the column ${name.trim().slice(0, 24)} is named twice, or two names mean the same. Rename one.`,
    place,
  );
}

function familiesOf(
  meanings: readonly (ColumnMeaning | undefined)[],
  names: readonly string[],
  place: Place,
): Map<string, Map<Family, Map<string, { column: number; unit: AngleUnit | undefined }>>> {
  const bodies: ReturnType<typeof familiesOf> = new Map();
  meanings.forEach((meaning, column) => {
    if (!meaning || meaning.kind === 'time') return;
    const families = bodies.get(meaning.body) ?? new Map();
    bodies.set(meaning.body, families);
    const found = families.get(meaning.kind) ?? new Map();
    families.set(meaning.kind, found);
    if (found.has(meaning.part)) throw doubled(names[column] ?? '', place);
    found.set(meaning.part, { column, unit: meaning.unit });
  });
  return bodies;
}

/** The form that is read, and whether there are more. What is begun and not whole goes to `missing`. */
function formOf(
  families: ReadonlyMap<Family, Found>,
  options: TableOptions,
  missing: string[],
  place: Place,
): { readonly form: BodyForm | undefined; readonly more: boolean } {
  const exact = [quaternionOf(families, missing), matrixOf(families.get('matrix'))].filter(
    (form) => form !== undefined,
  );
  const angles = families.get('angles');
  if (exact.length > 0) return { form: exact[0], more: exact.length > 1 || angles !== undefined };
  if (angles) return { form: anglesOf(angles, options, missing, place), more: false };
  return { form: axisAngleOf(families, options, missing, place), more: false };
}

function quaternionOf(families: ReadonlyMap<Family, Found>, missing: string[]): BodyForm | undefined {
  const named = families.get('quaternion');
  const plain = families.get('plain');
  // x, y, z alone are a position.
  const found = named ?? (plain?.has('w') === true ? plain : undefined);
  if (!found) return undefined;
  const columns = whole(found, QUATERNION);
  if (columns) return { form: { kind: 'quaternion' }, columns };
  const absent = QUATERNION.filter((part) => !found.has(part));
  missing.push(absent.map((part) => (named ? `q${part}` : part)).join(' '));
  return undefined;
}

/** Rows and columns are counted from 0 or from 1. */
function matrixOf(found: Found | undefined): BodyForm | undefined {
  if (!found) return undefined;
  const first = found.has('33') ? 1 : 0;
  const parts = [0, 1, 2].flatMap((column) => [0, 1, 2].map((row) => `${row + first}${column + first}`));
  const columns = whole(found, parts);
  return columns && { form: { kind: 'matrix' }, columns };
}

function axisAngleOf(
  families: ReadonlyMap<Family, Found>,
  options: TableOptions,
  missing: string[],
  place: Place,
): BodyForm | undefined {
  const turn = families.get('turn')?.get('angle');
  const axis = whole(families.get('axis') ?? new Map(), ['x', 'y', 'z']);
  if (!turn || !axis) return undefined;
  const unit = unitOf([turn.unit], options, place);
  if (unit !== undefined) return { form: { kind: 'axis-angle', unit }, columns: [...axis, turn.column] };
  missing.push('the unit of the angle (angle_deg, angle_rad)');
  return undefined;
}

function whole(found: Found, parts: readonly string[]): number[] | undefined {
  const columns = parts.flatMap((part) => found.get(part)?.column ?? []);
  return columns.length === parts.length ? columns : undefined;
}

function anglesOf(
  found: Found,
  options: TableOptions,
  missing: string[],
  place: Place,
): BodyForm | undefined {
  const sequence = sequenceOf(found, options, place);
  const unit = unitOf(
    [...found.values()].map((column) => column.unit),
    options,
    place,
  );
  if (sequence === undefined) missing.push('the sequence of the angles (such as YXZ)');
  if (unit === undefined) missing.push('the unit of the angles (rx_deg, rx_rad)');
  if (sequence === undefined || unit === undefined) return undefined;
  const placed = [...found].map(([part, { column }]) => ({ part: partOf(part, sequence), column }));
  if (placed.some(({ part }) => part < 0)) {
    missing.push(`angles that fit ${sequence} (name them r1 r2 r3, in the order in which they turn)`);
    return undefined;
  }
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  placed.sort((a, b) => a.part - b.part);
  const parts = placed.map(({ part }) => part);
  return { form: { kind: 'angles', sequence, parts, unit }, columns: placed.map(({ column }) => column) };
}

/** One angle alone needs no sequence. */
function sequenceOf(found: Found, options: TableOptions, place: Place): EulerSequence | undefined {
  if (options.euler !== undefined) {
    try {
      return eulerSequence(options.euler);
    } catch (cause) {
      if (!(cause instanceof SlewcurveError)) throw cause;
      throw new SlewcurveError(cause.code, `${place.file}: ${cause.message}`, place, { cause });
    }
  }
  const [only] = found.keys();
  const alone: Readonly<Record<string, EulerSequence>> = { x: 'XYZ', y: 'YXZ', z: 'ZXY' };
  return found.size === 1 ? alone[only ?? ''] : undefined;
}

/** Which angle of the sequence a column holds, -1 where that is not told: an axis that turns twice or never. */
function partOf(part: string, sequence: EulerSequence): number {
  const number = '123'.indexOf(part);
  if (number >= 0) return number;
  const first = sequence.toLowerCase().indexOf(part);
  return first === sequence.toLowerCase().lastIndexOf(part) ? first : -1;
}

function unitOf(
  named: readonly (AngleUnit | undefined)[],
  options: TableOptions,
  place: Place,
): AngleUnit | undefined {
  const units = new Set([...named, options.unit].filter((unit) => unit !== undefined));
  if (units.size > 1)
    throw new SlewcurveError(
      'delimited.unit-conflict',
      `${place.file}: the angles are said to be both degrees and radians. Make the names and --unit agree.`,
      place,
    );
  const [unit] = units;
  return unit;
}
