import type { Explanation } from '@slewcurve/survey';

/** What a word leads to, as people read it: the page of one thing, a line each of several. */
export function explanationText({ word, entries, didYouMean }: Explanation): string {
  const [only, ...more] = entries;
  if (only && more.length === 0) return only.page.endsWith('\n') ? only.page : `${only.page}\n`;
  if (only)
    return `${word} leads to:\n${entries.map(({ name, summary }) => `  ${name.padEnd(22)} ${summary}`).join('\n')}\n`;
  const hint = didYouMean.length > 0 ? ` Did you mean ${didYouMean.join(' or ')}?` : '';
  return `Nothing is known by the word ${word}.${hint}\n`;
}
