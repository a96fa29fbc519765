import type { CommandIo } from '../command-io.js';
import type { Arguments, CommandName } from '../flags.js';
import { compare } from './compare.js';
import { docket } from './docket.js';
import { explain } from './explain.js';
import { mend } from './mend.js';
import { check, survey } from './survey.js';

/** One command: one line in the table below. */
export interface Command {
  readonly name: CommandName;
  readonly usage: string;
  readonly summary: string;
  /** @returns the exit code */
  run(args: Arguments, io: CommandIo): Promise<number>;
}

export const COMMANDS: readonly Command[] = Object.freeze([
  {
    name: 'survey',
    usage: 'survey FILE…',
    summary: 'lists every rotation track with its figures, then what is wrong',
    run: survey,
  },
  {
    name: 'check',
    usage: 'check FILE…',
    summary: 'tells what is wrong and gives a verdict; FILE may be a folder or a pattern',
    run: check,
  },
  {
    name: 'mend',
    usage: 'mend FILE (--card JOB | --proposed) -o OUT',
    summary: 'mends a file and shows that nothing else changed',
    run: mend,
  },
  {
    name: 'compare',
    usage: 'compare A B [--angle DEG] [--rate DEG_PER_S]',
    summary: 'tells how far two files are apart as played, track by track',
    run: compare,
  },
  {
    name: 'docket',
    usage: 'docket FILE [--card JOB] [--format html -o OUT]',
    summary: 'writes the record that is handed on, of FILE as it is or as a job card leaves it',
    run: docket,
  },
  {
    name: 'explain',
    usage: 'explain WORD',
    summary: 'tells what a rule, a verb or a word of the trade means',
    run: explain,
  },
] satisfies readonly Command[]);
