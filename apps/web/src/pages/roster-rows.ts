import type { RosterRow as JobRow } from '@slewcurve/job';
import { trackInk, type Pyramid, type RosterRow } from '@slewcurve/elements/plot';
import type { Finding } from '@slewcurve/survey';
import type { FileWork } from '../session/file-work.js';

/** A track among all open files. */
export interface ChosenTrack {
  readonly file: string;
  readonly clip: string;
  readonly track: string;
}

/** Rows of the roster over all open files. */
export function rosterRows(files: readonly FileWork[]): RosterRow[] {
  return files.flatMap((file) =>
    [...file.rows.entries()].map(([key, row]) => rosterRow(file, row, file.findings.get(key) ?? [])),
  );
}

export function rowId({ file, clip, track }: ChosenTrack): string {
  return JSON.stringify([file, clip, track]);
}

export function trackOfRow(id: string): ChosenTrack {
  const [file, clip, track] = JSON.parse(id) as [string, string, string];
  return { file, clip, track };
}

// Inking every row at every change would cost more than drawing it.
const inks = new WeakMap<JobRow, Pyramid>();

function inkOf(row: JobRow): Pyramid {
  const known = inks.get(row);
  if (known) return known;
  const made = trackInk(row.columns, (row.end - row.start) / row.columns.length, row.noiseFloor);
  inks.set(row, made);
  return made;
}

function rosterRow(file: FileWork, row: JobRow, findings: readonly Finding[]): RosterRow {
  const places = findings.flatMap((finding) => finding.occurrences);
  const count = (level: string): number => findings.filter((finding) => finding.level === level).length;
  return {
    id: rowId({ file: file.id, clip: row.clip, track: row.track }),
    file: file.name,
    clip: row.clip,
    track: row.track,
    seconds: row.end - row.start,
    ink: inkOf(row),
    counts: { error: count('error'), warning: count('warning'), note: count('note') },
    families: familiesOf(findings),
    marks: places.map(({ time, level }) => ({ time: time - row.start, level })),
    peak: row.peak,
    travel: row.travelled,
    ...(findings[0]?.effect && { effect: findings[0].effect }),
  };
}

function familiesOf(findings: readonly Finding[]): Record<string, number> {
  const families: Record<string, number> = {};
  for (const { rule } of findings) {
    const family = rule.slice(0, rule.indexOf('.'));
    families[family] = (families[family] ?? 0) + 1;
  }
  return families;
}
