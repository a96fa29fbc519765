/** A word of this project and what else people call the thing. */
export interface Word {
  readonly kind: 'rule' | 'verb' | 'playback' | 'term' | 'page';
  /** Rule id, the edit's name on job cards, the playback's id, a word of this project, or what a part of the page is called. */
  readonly name: string;
  readonly summary: string;
  readonly alsoCalled: readonly string[];
}

/**
 * What a word leads to: by id or name, by family, by what the trade calls it, or by a single word of that. Case, hyphens and white space don't
 * matter.
 */
export function wordsFor<Known extends Word>(word: string, book: readonly Known[]): Known[] {
  const wanted = plainWord(word);
  if (wanted === '') return [];
  return book.filter(({ name, alsoCalled }) =>
    [...name.split('.'), name, ...alsoCalled]
      .map(plainWord)
      .some((known) => known === wanted || known.split(' ').includes(wanted)),
  );
}

/** A word without its case, its hyphens and more than one blank. */
export function plainWord(word: string): string {
  return word
    .trim()
    .toLowerCase()
    .replace(/[\s_-]+/g, ' ');
}
