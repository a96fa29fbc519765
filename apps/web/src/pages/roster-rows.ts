import type { RosterRow } from '@slewcurve/elements/plot';
import type { ReportedFinding } from '@slewcurve/job';
import type { FileWork, InkedRow } from '../session/file-work.js';

/** A track among all open files. */
export interface ChosenTrack {
  readonly file: string;
  readonly clip: string;
  readonly track: string;
}

/** Rows of the roster over all open files. A row of which nothing changed is the same object. */
export function rosterRows(files: readonly FileWork[]): RosterRow[] {
  return files.flatMap((file) =>
    [...file.rows].map(([key, row]) => rowOf(file, row, file.findings.get(key))),
  );
}

export function rowId({ file, clip, track }: ChosenTrack): string {
  return JSON.stringify([file, clip, track]);
}

export function trackOfRow(id: string): ChosenTrack {
  // oxlint-disable-next-line typescript/no-unsafe-type-assertion -- made by `rowId`
  const [file, clip, track] = JSON.parse(id) as [string, string, string];
  return { file, clip, track };
}

/** A row as it was made, and of which findings. */
interface Made {
  readonly of: readonly ReportedFinding[] | undefined;
  readonly row: RosterRow;
}

// A survey changes the roster many times a second, and one row at a time.
const made = new WeakMap<InkedRow, Made>();

function rowOf(file: FileWork, row: InkedRow, findings: readonly ReportedFinding[] | undefined): RosterRow {
  const known = made.get(row);
  if (known && known.of === findings) return known.row;
  const fresh = rosterRow(file, row, findings ?? []);
  made.set(row, { of: findings, row: fresh });
  return fresh;
}

function rosterRow(file: FileWork, row: InkedRow, findings: readonly ReportedFinding[]): RosterRow {
  const open = findings.filter(({ muted }) => muted === undefined);
  const places = open.flatMap(({ occurrences }) => occurrences.filter(({ stamp }) => stamp === undefined));
  const effect = worstEffect(open);
  const count = (level: string): number => open.filter((finding) => finding.level === level).length;
  return {
    id: rowId({ file: file.id, clip: row.clip, track: row.track }),
    file: file.name,
    clip: row.clip,
    track: row.track,
    seconds: row.end - row.start,
    ink: row.ink,
    counts: { error: count('error'), warning: count('warning'), note: count('note') },
    ...(findings.length > open.length && { accepted: findings.length - open.length }),
    places: open.reduce(
      (sum, { count: all, occurrences }) => sum + all - occurrences.filter(({ stamp }) => stamp).length,
      0,
    ),
    rules: [...new Set(findings.map(({ rule }) => rule))],
    families: familiesOf(open),
    marks: places.map(({ time, level }) => ({ time: time - row.start, level })),
    // Under the floor nothing is claimed.
    peak: row.peak > row.noiseFloor ? row.peak : 0,
    travel: row.travelled,
    ...(effect && { effect }),
  };
}

/** What is seen of the finding that is seen most. */
function worstEffect(findings: readonly ReportedFinding[]): ReportedFinding['effect'] {
  return findings.reduce<ReportedFinding['effect']>(
    (worst, { effect }) => (effect && effect.value > (worst?.value ?? 0) ? effect : worst),
    undefined,
  );
}

function familiesOf(findings: readonly ReportedFinding[]): Record<string, number> {
  const families: Record<string, number> = {};
  for (const { rule } of findings) {
    const family = rule.slice(0, rule.indexOf('.'));
    families[family] = (families[family] ?? 0) + 1;
  }
  return families;
}
