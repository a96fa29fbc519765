import { SlewcurveError } from '@slewcurve/core';
import { explanationText } from '@slewcurve/job';
import { explainWord } from '@slewcurve/survey';
import type { CommandIo } from '../command-io.js';
import { EXIT } from '../exit-code.js';
import type { Arguments } from '../flags.js';
import { oneOf } from '../settings.js';

/** `slewcurve explain WORD…`: what a rule, a verb or a playback is, by its own name or another. */
export async function explain(args: Arguments, io: CommandIo): Promise<number> {
  const word = args.words.join(' ');
  if (word === '')
    throw new SlewcurveError(
      'usage.no-word',
      'Name a rule, a verb or a word for what you see, for example: slewcurve explain pop',
    );
  const found = explainWord(word);
  io.stdout.write(
    oneOf(args, 'format', ['text', 'json']) === 'json'
      ? `${JSON.stringify(found, null, 2)}\n`
      : explanationText(found),
  );
  return found.entries.length > 0 ? EXIT.pass : EXIT.unable;
}
