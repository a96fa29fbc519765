import { SlewcurveError } from '@slewcurve/core';
import { takeBack } from '@slewcurve/job';
import type { CommandIo } from '../command-io.js';
import { EXIT } from '../exit-code.js';
import { writeOut } from '../files/write-out.js';
import type { Arguments } from '../flags.js';
import { readText } from '../settings.js';
import type { FileInHand } from '../with-file.js';

/**
 * `slewcurve mend FILE --undo PLAN -o OUT`: the bytes that FILE had before.
 *
 * @throws SlewcurveError what `takeBack` throws
 */
export async function undo(file: FileInHand, args: Arguments, io: CommandIo): Promise<number> {
  const plan = args.value('undo');
  if (plan === undefined)
    throw new SlewcurveError('usage.bad-value', '--undo takes the plan that --undo-out wrote.');
  const original = await takeBack(file.opened.source, await readText(plan, io.cwd()), file.opened.name);
  if (!args.given('dry-run')) await writeOut(file, original, args, io);
  io.stderr.write(`${file.opened.name}: ${original.size} bytes as they were before.\n`);
  return EXIT.pass;
}
