import { readFileSync, writeFileSync } from 'node:fs';
import { ownTimePoses } from './cases/own-times.js';
import { sharedKeyPoses } from './cases/pose.js';
import { slerpCases } from './cases/slerp.js';
import { squadCases } from './cases/squad.js';
import { trackCases } from './cases/track.js';
import { withTable } from './markdown-table.js';
import { seeded } from './motion-data.js';
import { nativeResult } from './native-slerp.js';
import { measureCase, type CaseResult } from './rounds.js';

/*
 * `npm run bench`: every case, its results into test/bench/results.json and the table of packages/core/docs/performance.md.
 * With words behind it (`npm run bench -- pose track-10000`) only the cases whose id begins so, and nothing is written.
 */

const ROUNDS = 41;
const RESULTS = 'test/bench/results.json';
const PAGE = 'packages/core/docs/performance.md';

const wanted = process.argv.slice(2);
const random = seeded(20);
const results: CaseResult[] = [];
for (const make of [slerpCases, trackCases, sharedKeyPoses, ownTimePoses, squadCases])
  for (const bench of await make()) {
    if (wanted.length > 0 && !wanted.some((start) => bench.id.startsWith(start))) continue;
    const result = measureCase(bench, ROUNDS, random);
    results.push(result);
    print(result);
  }
if (wanted.length === 0 || wanted.includes('native')) {
  const native = await nativeResult();
  if (native !== undefined) {
    results.push(native);
    print(native);
  }
}
console.log(`checksum ${checksum(results)}`);
if (wanted.length === 0) {
  const measured = { node: process.version, rounds: ROUNDS, results };
  writeFileSync(RESULTS, `${JSON.stringify(measured, null, 2)}\n`);
  writeFileSync(PAGE, withTable(readFileSync(PAGE, 'utf8'), results));
}

function print({ title, unit, contenders, pairs }: CaseResult): void {
  console.log(title);
  for (const { name, nanoseconds } of contenders)
    console.log(`  ${name.padEnd(26)} ${nanoseconds.median.toFixed(1).padStart(8)} ns a ${unit}`);
  for (const { ours, peer, speedUp } of pairs)
    console.log(
      `  ${ours} is ${speedUp.median.toFixed(2)} (${speedUp.p10.toFixed(2)} to ${speedUp.p90.toFixed(2)}) times as fast as ${peer}`,
    );
}

/** What all contenders made, so that a faster wrong answer shows: the same on every run of the same code. */
function checksum(all: readonly CaseResult[]): string {
  return all
    .flatMap(({ contenders }) => contenders.map((contender) => contender.checksum))
    .reduce((sum, value) => sum + value, 0)
    .toFixed(6);
}
