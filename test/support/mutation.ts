const LETTERS = new TextEncoder().encode('0123456789+-.eE,;\t \n\r"#{}[]:nai\u00e9\u0000');

/** One to three bytes made others, put in, taken out or doubled. */
export function mutatedBytes(bytes: Uint8Array, random: () => number): Uint8Array {
  let made = bytes;
  for (let n = below(3, random); n >= 0; n--) {
    const at = below(made.length, random);
    const length = below(12, random);
    const [before, after] = [made.subarray(0, at), made.subarray(at)];
    const kind = below(4, random);
    if (kind === 0) made = joined(before, [below(256, random)], after.subarray(1));
    else if (kind === 1) made = joined(before, [LETTERS[below(LETTERS.length, random)]], after);
    else if (kind === 2) made = joined(before, after.subarray(length));
    else made = joined(before, after.subarray(0, length), after);
  }
  return made;
}

function joined(...parts: readonly ArrayLike<number>[]): Uint8Array {
  const bytes = new Uint8Array(parts.reduce((sum, { length }) => sum + length, 0));
  let at = 0;
  for (const part of parts) {
    bytes.set(part, at);
    at += part.length;
  }
  return bytes;
}

/** JSON text of what stands in the place of a value. */
const ODD: readonly string[] = [
  '-1 0 -0 1 2 3 0.5 1e9 1e-320 1e308 1e400 4294967296 9007199254740993 null true'.split(' '),
  '"" "a" "*" "__proto__" "constructor" "\\ud800" "1e5" [] {} [[]] [1,0] [0,1e300]'.split(' '),
  ['{"__proto__":{"polluted":1}}', '{"length":1e9}', `"${'*'.repeat(60)}"`],
  ['['.repeat(300) + ']'.repeat(300)],
].flat();
const KEYS: readonly string[] = ['__proto__', 'constructor', 'toString', 'length', '', '*', '0', 'then'];

/** JSON text in which one to three values are made others, left out, swapped, or given again under the same or another key. */
export function mutatedJson(text: string, random: () => number): string {
  let made = text;
  for (let n = below(3, random); n >= 0; n--) made = oneOther(made, random);
  return made;
}

function oneOther(text: string, random: () => number): string {
  const values = [...text.matchAll(VALUE)];
  const one = values[below(values.length, random)];
  const other = values[below(values.length, random)];
  if (!one || !other) return text;
  const put = (instead: string): string =>
    text.slice(0, one.index) + instead + text.slice(one.index + one[0].length);
  const isKey = /^\s*:/.test(text.slice(one.index + one[0].length));
  const kind = below(isKey ? 3 : 6, random);
  if (isKey) {
    if (kind === 0) return put(JSON.stringify(KEYS[below(KEYS.length, random)]));
    // A doubled key: the last counts.
    const again = `${one[0]}:${ODD[below(ODD.length, random)]},${one[0]}`;
    return put(kind === 1 ? again : other[0]);
  }
  return kind === 0 ? put(other[0]) : put(ODD[below(ODD.length, random)]);
}

/** Strings, numbers, words, and containers that hold none. */
const VALUE =
  /"(?:[^"\\]|\\.)*"|-?\d+(?:\.\d+)?(?:[eE][-+]?\d+)?|\b(?:true|false|null)\b|\[[^[\]{}]*\]|\{[^[\]{}]*\}/g;

function below(count: number, random: () => number): number {
  return Math.floor(random() * count);
}
