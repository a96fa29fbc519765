/**
 * The known word that is nearest to a mistyped one, for "did you mean"; undefined where none is near: at most a third of its letters
 * may be wrong (Levenshtein distance, one for each letter put in, left out or changed).
 */
export function nearestWord(word: string, known: readonly string[]): string | undefined {
  let nearest: string | undefined;
  let least = Math.max(1, Math.floor(word.length / 3)) + 1;
  for (const candidate of known) {
    // So many letters at least are missing or too many; a word of any length costs no more than its own.
    if (Math.abs(word.length - candidate.length) >= least) continue;
    const distance = editDistance(word.toLowerCase(), candidate.toLowerCase());
    if (distance < least) [nearest, least] = [candidate, distance];
  }
  return nearest;
}

function editDistance(a: string, b: string): number {
  let row = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const next = [i];
    for (let j = 1; j <= b.length; j++)
      next[j] = Math.min(
        (row[j] ?? 0) + 1,
        (next[j - 1] ?? 0) + 1,
        (row[j - 1] ?? 0) + (a[i - 1] === b[j - 1] ? 0 : 1),
      );
    row = next;
  }
  return row[b.length] ?? 0;
}
