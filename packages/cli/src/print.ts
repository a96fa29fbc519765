import { resolve } from 'node:path';
import type { Paint } from '@slewcurve/job';
import type { CommandIo } from './command-io.js';
import { writeWhole } from './files/write-whole.js';
import type { Arguments } from './flags.js';

/** Print a text, or write it where `-o` says. @throws SlewcurveError `file.unwritable` */
export async function print(text: string, args: Arguments, io: CommandIo): Promise<void> {
  const out = args.value('o');
  if (out === undefined) io.stdout.write(text);
  else await writeText(resolve(io.cwd(), out), text);
}

/** Write a file of text, whole or not at all. @throws SlewcurveError `file.unwritable` */
export async function writeText(path: string, text: string): Promise<void> {
  await writeWhole(path, [new TextEncoder().encode(text)]);
}

/** Select Graphic Rendition (ECMA-48): red, yellow, faint; bold for the verdict. */
const COLOURS: Readonly<Record<Parameters<Paint>[1], string>> = {
  error: '31',
  warning: '33',
  note: '2',
  fail: '1;31',
  pass: '1',
};

/** Colours where a person looks: on a terminal that has them, unless NO_COLOR is set (no-color.org). */
export function paintFor({ stdout, env = {} }: CommandIo): Paint | undefined {
  const plain = (env['NO_COLOR'] ?? '') !== '' || env['TERM'] === 'dumb';
  if (plain || stdout.isTTY !== true) return undefined;
  return (text, as) => `\u001B[${COLOURS[as]}m${text}\u001B[0m`;
}
