import type { PatchRange } from '@slewcurve/formats';

/** More lines than this are read by nobody: they are told by what they are of. */
const MOST_LINES = 24;

/** What a plan changes of a file, a line a range; where there are many, a line for all ranges of one thing. */
export function sayRanges(file: string, ranges: readonly PatchRange[]): string[] {
  if (ranges.length <= MOST_LINES) return ranges.map((range) => `${file}: ${sayRange(range)}`);
  const things = new Map<string, PatchRange[]>();
  for (const range of ranges) {
    const own = things.get(thingOf(range));
    if (own) own.push(range);
    else things.set(thingOf(range), [range]);
  }
  const lines = [...things].map(([thing, own]) => `${file}: ${sayTogether(thing, own)}`);
  if (lines.length <= MOST_LINES) return lines;
  const rest = [...things.values()].slice(MOST_LINES - 1).flat();
  const more = `${lines.length - MOST_LINES + 1} more things`;
  return [...lines.slice(0, MOST_LINES - 1), `${file}: ${sayTogether(more, rest)}`];
}

function sayRange({ at, length, bytes, what }: PatchRange): string {
  return `bytes ${at} to ${at + length} become ${bytes.length}: ${what}`;
}

function sayTogether(thing: string, ranges: readonly PatchRange[]): string {
  const [first] = ranges;
  const last = ranges.at(-1);
  if (!first || !last || ranges.length === 1) return first ? sayRange(first) : thing;
  const old = ranges.reduce((sum, { length }) => sum + length, 0);
  const made = ranges.reduce((sum, { bytes }) => sum + bytes.length, 0);
  return `${ranges.length} ranges between bytes ${first.at} and ${last.at + last.length}, ${old} bytes in all, become ${made}: ${thing}`;
}

/** What a range is of, the number of its row or keys left out. */
function thingOf({ what }: PatchRange): string {
  return what.replace(/, row \d+$|(?<=: (?:time|times|values)) of keys? .*$/, '');
}
