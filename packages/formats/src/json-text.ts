import { parseJsonText } from './json-value.js';
import { decodeUtf8, encodeUtf8 } from './utf8.js';

/** Bytes from `start` up to `end`. */
export interface JsonSpan {
  readonly start: number;
  readonly end: number;
}

/** New bytes for `length` bytes at `at` of the JSON text. */
export interface JsonSplice {
  readonly at: number;
  readonly length: number;
  readonly bytes: Uint8Array;
  readonly what: string;
}

/**
 * Edits JSON as text. Everything that no edit names keeps its bytes: numbers as they are spelled, odd and doubled keys, order
 * and white space. Values are given as JSON text; pointers are RFC 6901's and always speak of the text before any edit.
 */
export interface JsonEditor {
  /** Where a value stands; undefined where there is none. Of doubled keys the last counts, as in `JSON.parse`. */
  find(pointer: string): JsonSpan | undefined;
  /** Puts a member's value in the place of the old one, or after the object's last member. */
  setMember(object: string, name: string, value: string): void;
  /** Puts a list's element in the place of the old one. */
  setElement(list: string, index: number, value: string): void;
  /** Adds an element to a member list of an object, which is made where it is missing. Returns the element's index. */
  append(object: string, name: string, value: string): number;
  /** Writes an object anew on one line: the given members are set, those named are left out, the others keep their text. */
  rewrite(object: string, set: Readonly<Record<string, string>>, leaveOut: readonly string[]): void;
  /** Puts bytes in the place of `length` others, for edits inside a string. */
  overwrite(at: number, length: number, bytes: Uint8Array, what: string): void;
  /** All edits, ascending and apart. */
  splices(): JsonSplice[];
}

/**
 * Finds places in JSON text and collects edits of it, so that every byte outside them stays.
 *
 * @param bytes UTF-8 of sound JSON: parse it first
 */
export function jsonEditor(bytes: Uint8Array): JsonEditor {
  const find = finder(bytes);
  const splices: JsonSplice[] = [];
  const additions = new Map<string, { readonly container: Container; readonly texts: string[] }>();
  const newLists = new Map<string, { object: string; name: string; values: string[] }>();

  const container = (pointer: string): Container => {
    const found = find(pointer);
    if (!found) throw new Error(`no JSON container at ${pointer}`);
    return found;
  };
  const replace = ({ start, end }: JsonSpan, text: string, pointer: string): void => {
    splices.push({ at: start, length: end - start, bytes: encodeUtf8(text), what: `JSON ${pointer}` });
  };
  const add = (pointer: string, text: string): void => {
    const known = additions.get(pointer);
    if (known) known.texts.push(text);
    else additions.set(pointer, { container: container(pointer), texts: [text] });
  };
  const editor: JsonEditor = {
    find: (pointer) => find(pointer)?.span,
    setMember: (object, name, value) => {
      const old = lastNamed(container(object), name);
      if (old) replace(old, value, childPointer(object, name));
      else add(object, `${JSON.stringify(name)}:${value}`);
    },
    setElement: (list, index, value) => {
      const old = container(list).children[index];
      if (!old) throw new Error(`no JSON element ${index} at ${list}`);
      replace(old, value, `${list}/${index}`);
    },
    append: (object, name, value) => {
      const pointer = childPointer(object, name);
      const list = find(pointer);
      if (list) {
        add(pointer, value);
        return list.children.length + (additions.get(pointer)?.texts.length ?? 1) - 1;
      }
      const made = newLists.get(pointer) ?? { object, name, values: [] };
      newLists.set(pointer, made);
      return made.values.push(value) - 1;
    },
    rewrite: (object, set, leaveOut) => {
      const found = container(object);
      const kept = found.children.filter(({ key }) => !Object.hasOwn(set, key) && !leaveOut.includes(key));
      const members = [
        ...kept.map(({ keyStart, end }) => decodeUtf8(bytes.subarray(keyStart, end))),
        ...Object.entries(set).map(([name, value]) => `${JSON.stringify(name)}:${value}`),
      ];
      replace(found.span, `{${members.join(',')}}`, object);
    },
    overwrite: (at, length, replacement, what) => {
      splices.push({ at, length, bytes: replacement, what });
    },
    splices: () => {
      for (const { object, name, values } of newLists.values())
        add(object, `${JSON.stringify(name)}:[${values.join(',')}]`);
      newLists.clear();
      const inserts = [...additions].map(([pointer, added]) =>
        insertion(pointer, added.container, added.texts),
      );
      const all = [...splices, ...inserts];
      // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
      return all.sort((a, b) => a.at - b.at || a.length - b.length);
    },
  };
  return editor;
}

function insertion(pointer: string, { span, children }: Container, texts: readonly string[]): JsonSplice {
  const last = children.at(-1);
  const at = last?.end ?? span.start + 1;
  return { at, length: 0, bytes: encodeUtf8((last ? ',' : '') + texts.join(',')), what: `JSON ${pointer}` };
}

function childPointer(pointer: string, name: string): string {
  return `${pointer}/${name.replaceAll('~', '~0').replaceAll('/', '~1')}`;
}

function lastNamed(container: Container, name: string): Child | undefined {
  let found: Child | undefined;
  for (const child of container.children) if (child.key === name) found = child;
  return found;
}

interface Container {
  readonly span: JsonSpan;
  readonly children: readonly Child[];
}

/** A member or element: its key (an element's is its index), where the key starts (an element's own start), its value. */
interface Child extends JsonSpan {
  readonly key: string;
  readonly keyStart: number;
}

/** Finds values by pointer. A container that was walked through once is remembered, so many pointers cost one scan. */
function finder(bytes: Uint8Array): (pointer: string) => Container | undefined {
  const scanned = new Map<number, readonly Child[]>();
  const open = (span: JsonSpan): Container => {
    let children = scanned.get(span.start);
    if (!children) scanned.set(span.start, (children = scanChildren(bytes, span.start)));
    return { span, children };
  };
  const start = skipBlank(bytes, startsWithMark(bytes) ? 3 : 0);
  const root = { start, end: skipValue(bytes, start) };
  return (pointer) => {
    let at: Container = open(root);
    for (const step of pointer.split('/').slice(1)) {
      const key = step.replaceAll('~1', '/').replaceAll('~0', '~');
      const next = lastNamed(at, key);
      if (!next) return undefined;
      at = open(next);
    }
    return at;
  };
}

const QUOTE = 0x22;
const BACKSLASH = 0x5c;
const COMMA = 0x2c;
const OPEN_LIST = 0x5b;
const CLOSE_LIST = 0x5d;
const OPEN_OBJECT = 0x7b;
const CLOSE_OBJECT = 0x7d;

function startsWithMark(bytes: Uint8Array): boolean {
  return bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf;
}

/** Children of the container that starts at `start`; none where a plain value does. */
function scanChildren(bytes: Uint8Array, start: number): Child[] {
  const children: Child[] = [];
  const isObject = bytes[start] === OPEN_OBJECT;
  if (!isObject && bytes[start] !== OPEN_LIST) return children;
  let at = skipBlank(bytes, start + 1);
  while (at < bytes.length && bytes[at] !== CLOSE_OBJECT && bytes[at] !== CLOSE_LIST) {
    const keyStart = at;
    let key = String(children.length);
    if (isObject) {
      const keyEnd = skipString(bytes, at);
      key = keyText(bytes.subarray(at, keyEnd));
      // Over the colon.
      at = skipBlank(bytes, skipBlank(bytes, keyEnd) + 1);
    }
    const end = skipValue(bytes, at);
    children.push({ key, keyStart, start: at, end });
    at = skipBlank(bytes, end);
    if (bytes[at] === COMMA) at = skipBlank(bytes, at + 1);
  }
  return children;
}

function keyText(quoted: Uint8Array): string {
  const key = parseJsonText(decodeUtf8(quoted));
  return typeof key === 'string' ? key : '';
}

function skipBlank(bytes: Uint8Array, from: number): number {
  let at = from;
  while (bytes[at] === 0x20 || bytes[at] === 0x0a || bytes[at] === 0x0d || bytes[at] === 0x09) at++;
  return at;
}

/** Past the string that starts at `from`. Bytes of a letter beyond ASCII are never a quote or a backslash in UTF-8. */
function skipString(bytes: Uint8Array, from: number): number {
  let at = from + 1;
  while (at < bytes.length && bytes[at] !== QUOTE) at += bytes[at] === BACKSLASH ? 2 : 1;
  return at + 1;
}

/** Past the value that starts at `from`, however deep it nests. */
function skipValue(bytes: Uint8Array, from: number): number {
  let depth = 0;
  let at = from;
  while (at < bytes.length) {
    const byte = bytes[at];
    if (byte === QUOTE) {
      at = skipString(bytes, at);
      if (depth === 0) return at;
      continue;
    }
    if (byte === OPEN_OBJECT || byte === OPEN_LIST) depth++;
    if (byte === CLOSE_OBJECT || byte === CLOSE_LIST) {
      // The bracket belongs to the container around a plain value.
      if (depth === 0) return at;
      depth--;
      if (depth === 0) return at + 1;
    }
    if (depth === 0 && (byte === COMMA || skipBlank(bytes, at) > at)) return at;
    at++;
  }
  return at;
}
