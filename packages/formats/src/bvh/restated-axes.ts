import { axisChange, changeAxesOfRate } from '@slewcurve/core';
import type { PatchRange } from '../patch-plan.js';
import type { Source } from '../source.js';
import { negatedText } from '../text/cell-change.js';
import { textLines, type TextLine } from '../text/text-lines.js';
import { encodeUtf8 } from '../utf8.js';

/** Where an old axis lies among the new ones, and which way. */
interface NewAxis {
  readonly index: number;
  readonly sign: 1 | -1;
}

/** What changes of axes, one after the other, make of the three axes. */
export interface AxisMap {
  /** By the old axis, 0 to 2: for directions. */
  readonly directions: readonly NewAxis[];
  /** The same for turns about it, which a change of hand reverses. */
  readonly turns: readonly NewAxis[];
}

/**
 * @param changes as `axisChange` reads them, in order
 * @throws SlewcurveError `axes.unknown`
 */
export function axisMap(changes: readonly string[]): AxisMap {
  const through = (isTurn: boolean): NewAxis[] =>
    [0, 1, 2].map((axis) => {
      let vector = [0, 1, 2].map((index) => Number(index === axis));
      for (const words of changes) {
        const change = axisChange(words);
        const turned = changeAxesOfRate([0, 0, 0], vector, change);
        const sign = isTurn || !changesHand(change) ? 1 : -1;
        vector = turned.map((part) => sign * part);
      }
      const index = vector.findIndex((part) => part !== 0);
      return { index, sign: (vector[index] ?? 1) < 0 ? -1 : 1 };
    });
  return { directions: through(false), turns: through(true) };
}

function changesHand(m: readonly number[]): boolean {
  const at = (i: number): number => m[i] ?? 0;
  const determinant =
    at(0) * (at(4) * at(8) - at(5) * at(7)) +
    at(3) * (at(7) * at(2) - at(8) * at(1)) +
    at(6) * (at(1) * at(5) - at(2) * at(4));
  return determinant < 0;
}

const LETTERS = 'XYZ';

/** The sequence whose letters name the new axes. */
export function restatedSequence(sequence: string | undefined, { turns }: AxisMap): string | undefined {
  return sequence?.replace(
    /[XYZ]/g,
    (letter) => LETTERS[turns[LETTERS.indexOf(letter)]?.index ?? 0] ?? letter,
  );
}

/** The HIERARCHY in new axes: what changes of it, and the columns of positions whose numbers change their sign. */
export interface RestatedHead {
  readonly ranges: readonly PatchRange[];
  readonly negated: readonly number[];
}

/** OFFSETs take new places and signs, digits and all; the CHANNELS name the new axes, so that every column stays where it is. */
export async function restatedHead(
  source: Source,
  file: string,
  motionAt: number,
  map: AxisMap,
): Promise<RestatedHead> {
  const ranges: PatchRange[] = [];
  const negated: number[] = [];
  let column = 0;
  let expects: 'offset' | 'count' | 'channel' | undefined;
  let left = 0;
  let offset: Word[] = [];
  for await (const lines of textLines(source, file))
    for (const line of lines) {
      if (line.number >= motionAt) return { ranges, negated };
      for (const word of wordsOf(line)) {
        if (expects === 'offset') {
          offset.push(word);
          if (offset.length < 3) continue;
          ranges.push(...movedOffset(offset, map));
          [expects, offset] = [undefined, []];
        } else if (expects === 'count') [expects, left] = ['channel', Number(word.text)];
        else if (expects === 'channel' && left > 0) {
          const channel = channelIn(word, map);
          ranges.push(...channel.ranges);
          if (channel.isNegated) negated.push(column);
          column++;
          left--;
        } else if (/^offset$/i.test(word.text)) expects = 'offset';
        else if (/^channels$/i.test(word.text)) expects = 'count';
      }
    }
  return { ranges, negated };
}

interface Word {
  readonly text: string;
  readonly at: number;
}

function wordsOf({ text, at }: TextLine): Word[] {
  return [...text.matchAll(/[^\s{}]+/g)].map((match) => ({ text: match[0], at: at + match.index }));
}

function movedOffset(old: readonly Word[], { directions }: AxisMap): PatchRange[] {
  const texts = old.map(({ text }) => text);
  old.forEach(({ text }, axis) => {
    const { index = axis, sign = 1 } = directions[axis] ?? {};
    texts[index] = sign < 0 ? negatedText(text) : text;
  });
  return old.flatMap(({ text, at }, i) => rangeWhere(text, texts[i] ?? text, at, 'OFFSET'));
}

function channelIn({ text, at }: Word, map: AxisMap): { ranges: PatchRange[]; isNegated: boolean } {
  const axis = LETTERS.indexOf(text.charAt(0).toUpperCase());
  const isPosition = /position$/i.test(text);
  const { index = axis, sign = 1 } = (isPosition ? map.directions : map.turns)[axis] ?? {};
  const letter = LETTERS.charAt(index);
  const first = text.charAt(0) === text.charAt(0).toUpperCase() ? letter : letter.toLowerCase();
  return {
    ranges: rangeWhere(text, first + text.slice(1), at, 'CHANNELS'),
    isNegated: isPosition && sign < 0,
  };
}

function rangeWhere(old: string, text: string, at: number, what: string): PatchRange[] {
  return text === old ? [] : [{ at, length: old.length, bytes: encodeUtf8(text), what }];
}
