import type { CaseResult } from './rounds.js';

const BEGIN = '<!-- measured: begin -->';
const END = '<!-- measured: end -->';

/** The page with the table between its two marks replaced. */
export function withTable(page: string, results: readonly CaseResult[]): string {
  const [head, rest] = page.split(BEGIN);
  const tail = rest?.split(END)[1];
  if (tail === undefined) throw new Error(`The page must hold ${BEGIN} and ${END}.`);
  return `${head}${BEGIN}\n\n${table(results)}\n\n${END}${tail}`;
}

function table(results: readonly CaseResult[]): string {
  const rows = results.flatMap(({ title, pairs }) =>
    pairs.map(
      ({ ours, peer, speedUp: { median, p10, p90 } }) =>
        `| ${title} | ${ours} | ${peer} | ${median.toFixed(2)} | ${p10.toFixed(2)} to ${p90.toFixed(2)} |`,
    ),
  );
  return [
    '| what | ours | peer | times as fast | p10 to p90 |',
    '| --- | --- | --- | ---: | ---: |',
    ...rows,
  ].join('\n');
}
