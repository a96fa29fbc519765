import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { jsonEditor, type JsonEditor } from '@slewcurve/formats';

const encode = (text: string): Uint8Array => new TextEncoder().encode(text);
const decode = (bytes: Uint8Array): string => new TextDecoder('utf-8', { ignoreBOM: true }).decode(bytes);

/** The text after edits, put together from the splices alone. */
function edited(text: string, edit: (editor: JsonEditor) => void): string {
  const bytes = encode(text);
  const editor = jsonEditor(bytes);
  edit(editor);
  const parts: string[] = [];
  let at = 0;
  for (const splice of editor.splices()) {
    expect(splice.at).toBeGreaterThanOrEqual(at);
    parts.push(decode(bytes.subarray(at, splice.at)), decode(splice.bytes));
    at = splice.at + splice.length;
  }
  return [...parts, decode(bytes.subarray(at))].join('');
}

/** JSON text of a value with white space wherever it may stand. */
function spaced(value: unknown, blanks: readonly string[]): string {
  let turn = 0;
  const blank = (): string => blanks[turn++ % blanks.length];
  const write = (part: unknown): string => {
    if (Array.isArray(part)) return `[${blank()}${part.map(write).join(`${blank()},${blank()}`)}${blank()}]`;
    if (typeof part !== 'object' || part === null) return JSON.stringify(part);
    const members = Object.entries(part).map(
      ([name, child]) => `${JSON.stringify(name)}${blank()}:${blank()}${write(child)}`,
    );
    return `{${blank()}${members.join(`${blank()},${blank()}`)}${blank()}}`;
  };
  return blank() + write(value) + blank();
}

const blanks = fc.array(fc.constantFrom('', ' ', '\n', '\t', '\r\n  '), { minLength: 1, maxLength: 9 });
const object = fc.dictionary(fc.string({ unit: 'binary', maxLength: 4 }), fc.jsonValue({ maxDepth: 3 }), {
  minKeys: 1,
  noNullPrototype: true,
});
const escape = (name: string): string => name.replaceAll('~', '~0').replaceAll('/', '~1');

/** The text after 1 and 2 were appended to its list `a`. */
function appended(text: string): string {
  return edited(text, (editor) => {
    const { a = [] }: { a?: unknown[] } = JSON.parse(text);
    expect(editor.append('', 'a', '1')).toBe(a.length);
    editor.append('', 'a', '2');
  });
}

describe('jsonEditor', () => {
  test('finds every value of any JSON, whatever its keys and white space', () => {
    fc.assert(
      fc.property(object, blanks, (value, space) => {
        const text = spaced(value, space);
        const bytes = encode(text);
        const editor = jsonEditor(bytes);
        const visit = (part: unknown, pointer: string): void => {
          const span = editor.find(pointer);
          expect(span && JSON.parse(decode(bytes.subarray(span.start, span.end)))).toEqual(
            JSON.parse(JSON.stringify(part)),
          );
          if (typeof part === 'object' && part !== null)
            for (const [name, child] of Object.entries(part)) visit(child, `${pointer}/${escape(name)}`);
        };
        visit(value, '');
        expect(editor.find('/no/such')).toBeUndefined();
      }),
    );
  });

  test('sets members so that a parser reads them, and nothing else changes', () => {
    fc.assert(
      fc.property(
        object,
        blanks,
        fc.string({ maxLength: 4 }),
        fc.jsonValue({ maxDepth: 1 }),
        (value, space, name, set) => {
          const text = spaced(value, space);
          const made = edited(text, (editor) => editor.setMember('', name, JSON.stringify(set)));
          const wanted: Record<string, unknown> = JSON.parse(text);
          Object.defineProperty(wanted, name, {
            value: JSON.parse(JSON.stringify(set)),
            enumerable: true,
            configurable: true,
            writable: true,
          });
          expect(JSON.parse(made)).toEqual(wanted);
        },
      ),
    );
  });

  test('adds elements behind the last, in an empty list and where there is no list', () => {
    expect(appended('{ "a" : [ 0 , {} ] }')).toBe('{ "a" : [ 0 , {},1,2 ] }');
    expect(appended('{"a":[ ]}')).toBe('{"a":[1,2 ]}');
    expect(appended('{"b":0 }')).toBe('{"b":0,"a":[1,2] }');
    expect(appended('{ }')).toBe('{"a":[1,2] }');
  });

  test('keeps the spelling of every number, key and blank that it does not edit', () => {
    const text =
      '\uFEFF{ "a":1.0 ,\n"b" : [1e-7,  12345678901234567890 ,1E+2],"\\u0063\\/":"\\u00e9é" , "a":-0.0}\t';
    expect(edited(text, (editor) => editor.setElement('/b', 1, '7'))).toBe(
      text.replace('12345678901234567890', '7'),
    );
  });

  test('takes the last of doubled keys, as JSON.parse does', () => {
    const text = '{"a":1,"b":{"a":5},"a":2}';
    const made = edited(text, (editor) => editor.setMember('', 'a', '3'));
    expect(made).toBe('{"a":1,"b":{"a":5},"a":3}');
    expect(JSON.parse(made)).toEqual({ a: 3, b: { a: 5 } });
  });

  test('writes an object anew with its other members to the byte', () => {
    const text = '[{ "count" : 3, "extras":{ "x" : 1.0 }, "sparse":{"count":1} ,"name":"a" }]';
    const made = edited(`{"list":${text}}`, (editor) =>
      editor.rewrite('/list/0', { count: '4' }, ['sparse']),
    );
    expect(made).toBe('{"list":[{"extras":{ "x" : 1.0 },"name":"a","count":4}]}');
  });

  test('walks through 100,000 nested lists', () => {
    const deep = `${'['.repeat(100_000)}${']'.repeat(100_000)}`;
    expect(edited(`{"deep":${deep},"a":1}`, (editor) => editor.setMember('', 'a', '2'))).toBe(
      `{"deep":${deep},"a":2}`,
    );
  });
});
