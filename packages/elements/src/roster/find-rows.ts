import { plainWord, wordsFor, type Word } from '@slewcurve/survey';
import { trackName } from '../chart/chart-data.js';
import { isBodyWord, isOfBody } from './body-words.js';
import type { RosterRow } from './roster-row.js';

/**
 * Rows that answer to every word of `text`, whatever the case: by file, clip or track, by what the joint is of the body ("knee"), by what
 * was found, or by what the trade calls that ("pop", "flip").
 *
 * @param book what else rules are called; left out, they go by their id alone
 */
export function findRows(
  rows: readonly RosterRow[],
  text: string,
  family = '',
  book: readonly Word[] = [],
): RosterRow[] {
  const words = text.trim().split(/\s+/).map(plainWord).filter(Boolean);
  const called = new Map(book.map(({ name, alsoCalled }) => [name, alsoCalled.map(plainWord)]));
  return rows.filter(
    (row) =>
      (family === '' || row.families[family] > 0) &&
      words.every(
        (word) =>
          namesOf(row).includes(word) ||
          isOfBody(trackName(row.track), word) ||
          // "Knee pop" is what a fault is called; who looks for the knee means the joint.
          (!isBodyWord(word) &&
            row.rules.some((rule) => rule.includes(word) || startsOne(called.get(rule) ?? [], word))),
      ),
  );
}

/** What a find field says where no row answers, and what the words lead to instead. */
export function foundNothing(
  text: string,
  book: readonly Word[],
): { readonly says: string; readonly leads: readonly Word[] } {
  if (text.trim() === '') return { says: 'No track has such a finding.', leads: [] };
  const leads = wordsFor(text, book).slice(0, 5);
  const more = leads.length > 0 ? 'The words lead to:' : 'Names are those of the file.';
  return {
    says: `No track answers to “${text}”, neither by name nor by what was found on it. ${more}`,
    leads,
  };
}

function namesOf({ file, clip, track }: RosterRow): string {
  return plainWord(`${file} ${clip} ${track}`);
}

/** One letter starts too much. */
function startsOne(called: readonly string[], word: string): boolean {
  return word.length > 1 && called.some((words) => words.split(' ').some((one) => one.startsWith(word)));
}
