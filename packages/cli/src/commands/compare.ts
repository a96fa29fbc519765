import { SlewcurveError } from '@slewcurve/core';
import { compareFiles, comparisonText, type ComparedFile } from '@slewcurve/job';
import type { CommandIo } from '../command-io.js';
import { EXIT } from '../exit-code.js';
import type { Arguments } from '../flags.js';
import { print } from '../print.js';
import { measureOf, oneOf, playbacksOf, tableOptionsOf } from '../settings.js';
import { withFile } from '../with-file.js';

/** `slewcurve compare A B`: how far two files are apart as one playback plays them, in degrees and deg/s. */
export async function compare(args: Arguments, io: CommandIo): Promise<number> {
  const [a, b, ...more] = args.words;
  if (a === undefined || b === undefined || more.length > 0)
    throw new SlewcurveError(
      'usage.two-files',
      `slewcurve compare takes two files; got ${args.words.length}.`,
    );
  const [playback = 'as-written', ...others] = playbacksOf(args) ?? [];
  if (others.length > 0)
    throw new SlewcurveError(
      'usage.bad-value',
      'slewcurve compare plays both files one way: name one playback.',
    );
  const asJson = oneOf(args, 'format', ['text', 'json']) === 'json';
  const [angle, rate] = [measureOf(args, 'angle'), measureOf(args, 'rate')];
  const limits = { ...(angle !== undefined && { angle }), ...(rate !== undefined && { rate }) };
  const comparison = await withBoth(a, b, args, io, (one, other) =>
    compareFiles(one, other, playback, limits),
  );
  const text = asJson ? `${JSON.stringify(comparison, null, 2)}\n` : comparisonText(comparison);
  await print(text, args, io);
  return comparison.verdict === 'pass' ? EXIT.pass : EXIT.fail;
}

function withBoth<T>(
  a: string,
  b: string,
  args: Arguments,
  io: CommandIo,
  work: (a: ComparedFile, b: ComparedFile) => T,
): Promise<T> {
  const table = tableOptionsOf(args);
  return withFile(a, io.cwd(), table, (one) =>
    withFile(b, io.cwd(), table, async (other) =>
      work(
        { name: one.opened.name, file: one.opened.file },
        { name: other.opened.name, file: other.opened.file },
      ),
    ),
  );
}
