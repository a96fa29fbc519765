import { SlewcurveError } from '@slewcurve/core';
import { VERSION } from '@slewcurve/job';
import { nearestWord } from '@slewcurve/mend';
import type { CommandIo } from './command-io.js';
import { COMMANDS, type Command } from './commands/commands.js';
import { EXIT } from './exit-code.js';
import { flagHelp, readArguments } from './flags.js';

/**
 * Run the command. The report goes to stdout, everything else to stderr.
 *
 * @param argv the words after `slewcurve`
 * @returns the exit code: 0 pass, 1 findings at or above the failing level, 2 could not do it
 */
export async function main(argv: readonly string[], io: CommandIo): Promise<number> {
  try {
    return await run(argv, io);
  } catch (error) {
    if (!(error instanceof SlewcurveError)) {
      io.stderr.write(
        `slewcurve: a fault of its own, please report it: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`,
      );
      return EXIT.unable;
    }
    io.stderr.write(`slewcurve: ${error.message} ${error.code}\n`);
    return EXIT.unable;
  }
}

async function run([name, ...rest]: readonly string[], io: CommandIo): Promise<number> {
  if (name === undefined) {
    io.stderr.write(overview());
    return EXIT.unable;
  }
  if (name === '--help' || name === '-h' || name === 'help') {
    io.stdout.write(overview());
    return EXIT.pass;
  }
  if (name === '--version') {
    io.stdout.write(`slewcurve ${VERSION}\n`);
    return EXIT.pass;
  }
  const command = commandNamed(name);
  if (rest.includes('--help') || rest.includes('-h')) {
    io.stdout.write(helpOf(command));
    return EXIT.pass;
  }
  return command.run(readArguments(command.name, rest), io);
}

function commandNamed(name: string): Command {
  const command = COMMANDS.find((other) => other.name === name);
  if (command) return command;
  const names = COMMANDS.map((other) => other.name);
  const nearest = nearestWord(name, names);
  const hint = nearest === undefined ? `It knows ${names.join(', ')}.` : `Did you mean ${nearest}?`;
  throw new SlewcurveError('usage.unknown-command', `slewcurve has no command ${name}. ${hint}`);
}

function overview(): string {
  const rows = COMMANDS.map((command) => `  slewcurve ${command.usage.padEnd(44)} ${command.summary}`);
  return `slewcurve checks and mends the rotation tracks of animation files.

${rows.join('\n')}

slewcurve COMMAND --help tells the flags. Exit: 0 pass, 1 findings at or above --fail-at, 2 could not do it.
`;
}

function helpOf(command: Command): string {
  return `slewcurve ${command.usage}\n\n${command.summary}\n\n${flagHelp(command.name)}\n`;
}
