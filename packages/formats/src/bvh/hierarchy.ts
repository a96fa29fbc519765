import type { FileProblem } from '../animation-file.js';
import { type DecimalText, readDecimal } from '../text/decimal-text.js';
import { type LinePlace, lineError, lineProblem, quoted } from '../text/text-fault.js';
import type { TextLine } from '../text/text-lines.js';
import { decodeUtf8 } from '../utf8.js';

interface Channel {
  readonly axis: 'X' | 'Y' | 'Z';
  readonly moves: 'position' | 'rotation' | 'scale';
}

/** A joint of a BVH file as its HIERARCHY declares it, or an end site, which has no channels. */
export interface Joint {
  readonly name: string;
  readonly endSite: boolean;
  /** Index of the parent, -1 at a root. */
  readonly parent: number;
  /** From the parent's joint, in the file's unit. */
  readonly offset: readonly number[];
  /** In the file's order. */
  readonly channels: readonly Channel[];
  /** Column of the first channel in every row. */
  readonly firstColumn: number;
  /** Where its CHANNELS stand, or its name where it has none. */
  readonly line: LinePlace;
}

/** The joints of a file and how many numbers each row of its MOTION must have. */
export interface Hierarchy {
  readonly joints: readonly Joint[];
  readonly columns: number;
}

/** Takes the lines up to MOTION one by one. */
export interface HierarchyReader {
  /** @returns whether the line was MOTION, which ends the hierarchy */
  take(line: TextLine): boolean;
  done(): Hierarchy;
}

type Draft = { -readonly [Part in keyof Joint]: Joint[Part] };

interface Reading {
  readonly file: string;
  readonly problems: FileProblem[];
  readonly joints: Draft[];
  readonly stack: { readonly joint: Draft; readonly index: number; opened: boolean }[];
  columns: number;
  ended: boolean;
}

type Statement = (reading: Reading, line: TextLine, words: Words) => void;

const WORDS = /[{}]|[^\s{}]+/g;
const CHANNEL = /^([xyz])(position|rotation|scale)$/i;

const STATEMENTS: ReadonlyMap<string, Statement> = new Map([
  ['HIERARCHY', () => undefined],
  ['ROOT', readRoot],
  ['JOINT', readJoint],
  ['END', readEndSite],
  ['{', openBrace],
  ['}', closeBrace],
  ['OFFSET', readOffset],
  ['CHANNELS', readChannels],
  ['MOTION', endHierarchy],
]);

/**
 * Reads HIERARCHY as files have it: keywords in any case, several statements on a line, names with spaces, more than one ROOT.
 * Faults throw with their line: `bvh.no-hierarchy`, `bvh.unexpected-word`, `bvh.bad-number`, `bvh.channel-count`,
 * `bvh.unknown-channel`, `bvh.brace`.
 */
export function hierarchyReader(file: string, problems: FileProblem[]): HierarchyReader {
  const reading: Reading = { file, problems, joints: [], stack: [], columns: 0, ended: false };
  let started = false;
  return {
    take(line) {
      const words = wordsOf(line);
      for (let word = words.next(); word !== undefined && !reading.ended; word = words.next()) {
        if (!started && word.toUpperCase() !== 'HIERARCHY')
          throw lineError(
            file,
            'bvh.no-hierarchy',
            line,
            `a BVH file begins with HIERARCHY, not ${quoted(word)}.`,
          );
        started = true;
        statementOf(file, line, word)(reading, line, words);
      }
      return reading.ended;
    },
    done: () => reading,
  };
}

function statementOf(file: string, line: TextLine, word: string): Statement {
  const statement = STATEMENTS.get(word.toUpperCase());
  if (statement) return statement;
  throw lineError(
    file,
    'bvh.unexpected-word',
    line,
    `${quoted(word)} is none of ROOT, JOINT, End Site, OFFSET, CHANNELS, MOTION and braces.`,
  );
}

function readRoot(reading: Reading, line: TextLine, words: Words): void {
  if (reading.stack.length > 0)
    throw lineError(
      reading.file,
      'bvh.brace',
      line,
      'a ROOT begins while a joint is open; a } is missing before it.',
    );
  begin(reading, line, words.name(), false);
}

function readJoint(reading: Reading, line: TextLine, words: Words): void {
  inside(reading, line, 'JOINT');
  begin(reading, line, words.name(), false);
}

function readEndSite(reading: Reading, line: TextLine, words: Words): void {
  inside(reading, line, 'End Site');
  words.name();
  begin(reading, line, 'End Site', true);
}

function begin(reading: Reading, line: TextLine, name: string, endSite: boolean): void {
  const { joints, stack, columns } = reading;
  const parent = stack.at(-1)?.index ?? -1;
  const place = { number: line.number, at: line.at };
  const joint = {
    name,
    endSite,
    parent,
    offset: [0, 0, 0],
    channels: [],
    firstColumn: columns,
    line: place,
  };
  stack.push({ joint, index: joints.length, opened: false });
  joints.push(joint);
}

/** The joint whose braces are open, for a statement that belongs inside. */
function inside({ file, stack }: Reading, line: TextLine, word: string): Draft {
  const open = stack.at(-1);
  if (open?.opened === true) return open.joint;
  throw lineError(
    file,
    'bvh.brace',
    line,
    `${word} must stand between the braces of a joint; a { is missing before it.`,
  );
}

function openBrace({ file, stack }: Reading, line: TextLine): void {
  const open = stack.at(-1);
  if (!open || open.opened)
    throw lineError(file, 'bvh.brace', line, 'this { follows no ROOT, JOINT or End Site.');
  open.opened = true;
}

function closeBrace({ file, stack }: Reading, line: TextLine): void {
  if (stack.pop()?.opened !== true)
    throw lineError(file, 'bvh.brace', line, 'this } closes nothing that is open.');
}

function readOffset(reading: Reading, line: TextLine, words: Words): void {
  const joint = inside(reading, line, 'OFFSET');
  joint.offset = [0, 1, 2].map(() => numberOf(reading.file, line, words.next(), 'a number of OFFSET'));
}

function readChannels(reading: Reading, line: TextLine, words: Words): void {
  const { file } = reading;
  const joint = inside(reading, line, 'CHANNELS');
  if (joint.channels.length > 0)
    throw lineError(file, 'bvh.unexpected-word', line, `${quoted(joint.name)} has CHANNELS already.`);
  const count = numberOf(file, line, words.next(), 'the number of CHANNELS');
  const names: string[] = [];
  for (let next = words.peek(); next !== undefined && next !== '}'; next = words.peek()) {
    names.push(next);
    words.next();
  }
  if (names.length !== count)
    throw lineError(
      file,
      'bvh.channel-count',
      line,
      `CHANNELS says ${count} and names ${names.length}. Correct whichever is wrong.`,
    );
  joint.firstColumn = reading.columns;
  joint.line = { number: line.number, at: line.at };
  joint.channels = names.map((name) => channelOf(file, line, name));
  reading.columns += names.length;
}

function endHierarchy(reading: Reading, line: TextLine): void {
  const { file, problems, stack } = reading;
  if (stack.length > 0)
    problems.push(
      lineProblem(
        file,
        'bvh.brace',
        'warning',
        line,
        `MOTION begins while ${stack.length} joints are open; so many } are missing before it.`,
      ),
    );
  reading.ended = true;
}

interface Words {
  peek(): string | undefined;
  next(): string | undefined;
  /** What is left of the line up to a brace, with its inner spaces. */
  name(): string;
}

function wordsOf(line: TextLine): Words {
  const text = readableText(line);
  const found = [...text.matchAll(WORDS)];
  let at = 0;
  return {
    peek: () => found[at]?.[0],
    next: () => found[at++]?.[0],
    name() {
      const from = found[at]?.index ?? text.length;
      while (at < found.length && found[at]?.[0] !== '{') at++;
      return text.slice(from, found[at]?.index ?? text.length).trim();
    },
  };
}

/** The line's text as UTF-8 where it is that, a letter a byte where not. */
function readableText({ bytes, text }: TextLine): string {
  try {
    return decodeUtf8(bytes);
  } catch {
    return text;
  }
}

function channelOf(file: string, line: TextLine, name: string): Channel {
  const parts = CHANNEL.exec(name);
  const axis = parts?.[1]?.toUpperCase();
  const moves = parts?.[2]?.toLowerCase();
  if (
    (axis === 'X' || axis === 'Y' || axis === 'Z') &&
    (moves === 'position' || moves === 'rotation' || moves === 'scale')
  )
    return { axis, moves };
  throw lineError(
    file,
    'bvh.unknown-channel',
    line,
    `${quoted(name)} is no channel; there are Xposition to Zposition and Xrotation to Zrotation.`,
  );
}

function numberOf(file: string, line: TextLine, word: string | undefined, what: string): number {
  const number: DecimalText = { value: 0, decimals: 0 };
  if (word !== undefined && readDecimal(number, word) && Number.isFinite(number.value)) return number.value;
  const found = word === undefined ? 'the line ends' : `${quoted(word)} stands`;
  throw lineError(file, 'bvh.bad-number', line, `${found} where ${what} is expected.`);
}
