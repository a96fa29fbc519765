import { PLAYBACKS } from '@slewcurve/core';
import { VERBS, nearestWord } from '@slewcurve/mend';
import { COMPARISON_RULES } from './comparison-rule.js';
import { RULES } from './registry.js';
import { rulePage } from './rule-page.js';
import { TERMS } from './terms.js';
import { plainWord, wordsFor, type Word } from './word.js';

/** A rule, an edit, a playback or a word of this project that a word leads to. */
export interface Entry extends Word {
  /** The rule's page in Markdown; of an edit or a playback, its name, summary and other names. */
  readonly page: string;
}

/** What a word leads to: entries, or else the words that may be meant. */
export interface Explanation {
  readonly word: string;
  readonly entries: readonly Entry[];
  readonly didYouMean: readonly string[];
}

/**
 * Rules, edits and playbacks that a word leads to: by id or name alone where it is one, by family, by what the trade calls them, or by a single
 * word of that. Case, hyphens and white space don't matter. Where nothing fits, the nearest known words.
 */
export function explainWord(word: string): Explanation {
  const wanted = plainWord(word);
  // A playback's name is a word of the trade as well: what goes wrong by it is shown beside it.
  const named = ENTRIES.filter(({ kind, name }) => kind !== 'playback' && plainWord(name) === wanted);
  const entries = named.length > 0 ? named : wordsFor(word, ENTRIES);
  return { word, entries, didYouMean: entries.length > 0 ? [] : wordsMeant(word) };
}

const ENTRIES: readonly Entry[] = Object.freeze([
  ...[...RULES, ...COMPARISON_RULES].map((rule) => ({
    kind: 'rule' as const,
    name: rule.id,
    summary: rule.summary,
    alsoCalled: rule.alsoCalled,
    page: rulePage(rule),
  })),
  ...VERBS.map(({ name, summary, alsoCalled }) => ({
    kind: 'verb' as const,
    name,
    summary,
    alsoCalled,
    page: `# ${name}\n\n${summary}\n\nAlso called: ${alsoCalled.join(', ')}.\n`,
  })),
  ...Object.values(PLAYBACKS).map(({ id, says }) => ({
    kind: 'playback' as const,
    name: id,
    summary: `A playback, how some program plays a file: ${says}.`,
    alsoCalled: ['playback', 'interpolation', ...(id === 'step' ? ['stepped', 'no interpolation'] : [])],
    page: `# ${id}\n\nA playback: how some program plays a file. This one: ${says}.\n`,
  })),
  ...TERMS.map((term) => ({
    ...term,
    page: `# ${term.name}\n\n${term.summary}\n\nAlso called: ${term.alsoCalled.join(', ')}.\n`,
  })),
]);

/** Every word that leads to an entry whole: for completion and for a find field. */
const WORDS: ReadonlyMap<string, string> = new Map(
  ENTRIES.flatMap(({ name, alsoCalled }) =>
    [name, ...name.split('.'), ...alsoCalled].map((word) => [plainWord(word), word] as const),
  ),
);

/** All that `explainWord` knows, without the pages: for a find field. */
export function wordBook(): Word[] {
  // The page has words of its own for its parts.
  return ENTRIES.filter(({ kind }) => kind !== 'term').map(({ kind, name, summary, alsoCalled }) => ({
    kind,
    name,
    summary,
    alsoCalled,
  }));
}

function wordsMeant(word: string): string[] {
  const wanted = plainWord(word).slice(0, 60);
  const nearest = nearestWord(wanted, [...WORDS.keys()]);
  return nearest === undefined ? [] : [WORDS.get(nearest) ?? nearest];
}
