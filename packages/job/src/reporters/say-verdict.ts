import type { Report } from '../report.js';

/** The report's last line: `verdict: fail. 1 error, 3 warnings, 2 notes in 4 files, 2 stamped`. */
export function sayVerdict({ files, totals, verdict, gone }: Report): string {
  const unreadable = files.filter((file) => file.status === 'unreadable').length;
  const counts = [
    counted(totals.error, 'error'),
    counted(totals.warning, 'warning'),
    counted(totals.note, 'note'),
  ].join(', ');
  const more = [
    ...(totals.known === undefined ? [] : [`${totals.known} known from the baseline`]),
    ...(gone === undefined || gone.length === 0 ? [] : [`${gone.length} of the baseline gone`]),
    ...(unreadable === 0 ? [] : [`${unreadable} could not be read`]),
  ];
  return [
    `verdict: ${verdict}. ${counts} in ${counted(files.length, 'file')}, ${totals.stamped} stamped`,
    ...more,
  ].join('; ');
}

/** `1 file`, `2 files`. */
export function counted(count: number, what: string): string {
  return `${count} ${what}${count === 1 ? '' : 's'}`;
}
