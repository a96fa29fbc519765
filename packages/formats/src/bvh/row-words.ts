/** The words of a row, as where each begins and ends, two numbers a word. Gives how many there are. */
export function findWords(out: number[], text: string): number {
  let words = 0;
  let inWord = false;
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i);
    const space = code === 0x20 || code === 0x09 || code === 0x0b || code === 0x0c;
    if (space === inWord) {
      if (inWord) out[2 * words++ + 1] = i;
      else out[2 * words] = i;
      inWord = !inWord;
    }
  }
  if (inWord) out[2 * words++ + 1] = text.length;
  return words;
}
