/**
 * Whether a name fits a pattern in which `*` stands for any run of characters, `/` and none included; everything else stands for
 * itself, case and all. Takes time in proportion to the two lengths' product at worst.
 */
export function matchesPattern(pattern: string, name: string): boolean {
  const parts = pattern.split('*');
  const first = parts.shift() ?? '';
  const last = parts.pop();
  if (last === undefined) return name === pattern;
  if (name.length < first.length + last.length) return false;
  if (!name.startsWith(first) || !name.endsWith(last)) return false;
  let at = first.length;
  const end = name.length - last.length;
  for (const part of parts) {
    const found = name.indexOf(part, at);
    if (found < 0 || found + part.length > end) return false;
    at = found + part.length;
  }
  return true;
}
