import { SlewcurveError } from '@slewcurve/core';

/** The fields of one JSON object of a file of ours, read with errors that name the file, the field and what is allowed. */
export interface Fields {
  text(name: string): string;
  optionalText(name: string): string | undefined;
  /** A whole number, 1 or more. */
  optionalCount(name: string): number | undefined;
  list<T>(name: string, read: (fields: Fields) => T): T[];
}

/** What the errors say of the file. */
interface FileKind {
  /** First part of the codes: `stamps`, `baseline`. */
  readonly code: string;
  /** As the sentence names it. */
  readonly name: string;
}

/**
 * Fields of a JSON object whose keys are all known.
 *
 * @throws SlewcurveError `<code>.bad-shape`, `<code>.unknown-key`; also what its readers throw
 */
export function readFields(
  json: unknown,
  known: Readonly<Record<string, readonly string[]>>,
  kind: FileKind,
  at = '',
): Fields {
  const bad = (pointer: string, wanted: string, value: unknown): SlewcurveError =>
    new SlewcurveError(
      `${kind.code}.bad-shape`,
      `${kind.name}: ${pointer || 'the top'} must be ${wanted}; it is ${shown(value)}.`,
      { pointer },
    );
  if (!isRecord(json)) throw bad(at, 'an object', json);
  const keys = known[at.replace(/^.*\/([^/]*)\/\d+$/, '$1')] ?? [];
  const stranger = Object.keys(json).find((key) => !keys.includes(key));
  if (stranger !== undefined)
    throw new SlewcurveError(
      `${kind.code}.unknown-key`,
      `${kind.name}: ${at || 'the top'} has a key ${shown(stranger)}. There are: ${keys.join(', ')}.`,
      { pointer: `${at}/${stranger}` },
    );
  const optionalText = (name: string): string | undefined => {
    const value = json[name];
    if (value === undefined || typeof value === 'string') return value;
    throw bad(`${at}/${name}`, 'text', value);
  };
  return {
    optionalText,
    text(name) {
      const value = optionalText(name);
      if (value !== undefined && value.trim() !== '') return value;
      throw bad(`${at}/${name}`, 'text', value);
    },
    optionalCount(name) {
      const value = json[name];
      if (value === undefined) return undefined;
      if (typeof value === 'number' && Number.isSafeInteger(value) && value >= 1) return value;
      throw bad(`${at}/${name}`, 'a whole number from 1', value);
    },
    list(name, read) {
      const value = json[name];
      if (!Array.isArray(value)) throw bad(`${at}/${name}`, 'a list', value);
      return value.map((entry: unknown, i) => read(readFields(entry, known, kind, `${at}/${name}/${i}`)));
    },
  };
}

/**
 * Holds a file of ours to version 1 of its format.
 *
 * @throws SlewcurveError `<code>.bad-version`
 */
export function checkVersion(json: unknown, kind: FileKind): void {
  const version = isRecord(json) ? json['schemaVersion'] : 1;
  if (version !== 1)
    throw new SlewcurveError(
      `${kind.code}.bad-version`,
      `${kind.name}: schemaVersion must be 1; it is ${shown(version)}.`,
      { pointer: '/schemaVersion' },
    );
}

function isRecord(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function shown(value: unknown): string {
  return value === undefined ? 'left out' : (JSON.stringify(value) ?? typeof value).slice(0, 60);
}
