/** What JSON text holds. Members are read through `member`, so that names such as `__proto__` reach nothing. */
export type Json = null | boolean | number | string | readonly Json[] | JsonObject;

export interface JsonObject {
  readonly [name: string]: Json | undefined;
}

/** JSON text as a value. Throws a SyntaxError where it is none. */
export function parseJsonText(text: string): Json {
  const value: Json = JSON.parse(text);
  return value;
}

export function isObject(value: Json | undefined): value is JsonObject {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

/** The object's own member of that name; undefined where there is none, or no object. */
export function member(value: Json | undefined, name: string): Json | undefined {
  return isObject(value) && Object.hasOwn(value, name) ? value[name] : undefined;
}

/** The member as a list; empty where it is none. */
export function listMember(value: Json | undefined, name: string): readonly Json[] {
  const list = member(value, name);
  return Array.isArray(list) ? list : [];
}

/** The member as a list of exactly `length` finite numbers; undefined where it is none. */
export function numbersMember(
  value: Json | undefined,
  name: string,
  length: number,
): readonly number[] | undefined {
  const list = listMember(value, name);
  const numbers = list.filter(
    (entry): entry is number => typeof entry === 'number' && Number.isFinite(entry),
  );
  return list.length === length && numbers.length === length ? numbers : undefined;
}

/** The member as a whole number from 0 that float64 holds exactly; undefined where it is none. */
export function countMember(value: Json | undefined, name: string): number | undefined {
  const count = member(value, name);
  return typeof count === 'number' && Number.isSafeInteger(count) && count >= 0 ? count : undefined;
}

/** The member as text; undefined where it is none. */
export function textMember(value: Json | undefined, name: string): string | undefined {
  const text = member(value, name);
  return typeof text === 'string' ? text : undefined;
}

/** A message's view of any value: short, on one line, whatever a file holds. */
export function shown(value: Json | undefined): string {
  if (value === undefined) return 'nothing';
  if (Array.isArray(value)) return `a list of ${value.length}`;
  if (isObject(value)) return 'an object';
  const text = JSON.stringify(value);
  return text.length > 40 ? `${text.slice(0, 39)}…` : text;
}
