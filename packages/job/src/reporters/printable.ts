/** A line for a terminal: names come from strangers' files, and a control character in one neither moves the cursor nor ends the line. */
export function printable(line: string): string {
  return line.replace(
    /[\p{Cc}\u2028\u2029]/gu,
    (letter) => `\\u${letter.charCodeAt(0).toString(16).padStart(4, '0')}`,
  );
}
