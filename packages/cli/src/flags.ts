import { parseArgs } from 'node:util';
import { PLAYBACKS, STORAGE_MODELS, SlewcurveError, TICK_READINGS, TIME_FORMS } from '@slewcurve/core';
import { REPORT_FORMATS, UPS, USUAL_TICKS } from '@slewcurve/job';
import { nearestWord } from '@slewcurve/mend';
import { ROLES } from '@slewcurve/survey';
import { messageOf } from './system-error.js';

/** A flag of the command line: one line here, and help and parsing know it. */
interface Flag {
  /** What stands after it in the help; a switch has none. */
  readonly value?: string;
  /** The same where a command takes other values than the rest. */
  readonly valueFor?: Readonly<Partial<Record<CommandName, string>>>;
  readonly help: string;
  /** Commands that take it. */
  readonly commands: readonly CommandName[];
}

export type CommandName = 'survey' | 'check' | 'mend' | 'compare' | 'docket' | 'explain';

/** The flags; `-o` is written with one dash. */
export type FlagName =
  | 'format'
  | 'o'
  | 'playback'
  | 'fail-at'
  | 'allow-warnings'
  | 'rules'
  | 'role'
  | 'loop'
  | 'columns'
  | 'euler'
  | 'unit'
  | 'up'
  | 'hand'
  | 'space'
  | 'fps'
  | 'time'
  | 'matrix'
  | 'ticks'
  | 'reading'
  | 'storage'
  | 'card'
  | 'proposed'
  | 'allow'
  | 'in-place'
  | 'dry-run'
  | 'card-out'
  | 'undo-out'
  | 'undo'
  | 'baseline'
  | 'baseline-out'
  | 'baseline-exact'
  | 'stamp'
  | 'reason'
  | 'by'
  | 'allow-no-match'
  | 'workers'
  | 'shard'
  | 'merge'
  | 'angle'
  | 'rate';

const REPORTING: readonly CommandName[] = ['survey', 'check'];
const SURVEYING: readonly CommandName[] = ['survey', 'check', 'mend', 'docket'];
const OPENING: readonly CommandName[] = [...SURVEYING, 'compare'];
const MENDING: readonly CommandName[] = ['mend'];

const FLAGS: Readonly<Record<FlagName, Flag>> = Object.freeze({
  format: {
    value: 'text|json',
    valueFor: {
      survey: REPORT_FORMATS.join('|'),
      check: REPORT_FORMATS.join('|'),
      docket: 'markdown|html',
    },
    help: 'form of what is printed; the first is the default',
    commands: ['survey', 'check', 'mend', 'compare', 'docket', 'explain'],
  },
  o: {
    value: 'OUT',
    help: 'file to write, instead of printing',
    commands: ['survey', 'check', 'mend', 'compare', 'docket'],
  },
  playback: {
    value: 'ID,…',
    help: `how the file will be played: ${Object.keys(PLAYBACKS).join(', ')}; the worst counts (default as-written)`,
    commands: OPENING,
  },
  'fail-at': {
    value: 'error|warning|note',
    help: 'level at which a finding fails the run (default warning)',
    commands: SURVEYING,
  },
  'allow-warnings': { value: 'N', help: 'let so many warnings pass (default 0)', commands: SURVEYING },
  rules: { value: 'FILE', help: 'house rules: limits, levels, exceptions (JSON)', commands: SURVEYING },
  role: {
    value: '[PATTERN=]ROLE',
    help: `what turns: ${ROLES.join(', ')}; for all tracks or those that fit (again for more)`,
    commands: SURVEYING,
  },
  columns: {
    value: 'NAME,…',
    help: 'names of the columns of delimited text, such as timestamp,tx,ty,tz,qx,qy,qz,qw',
    commands: OPENING,
  },
  euler: {
    value: 'SEQUENCE',
    help: 'sequence of the angles of delimited text: YXZ about the turned axes, yxz about fixed ones',
    commands: OPENING,
  },
  unit: { value: 'deg|rad', help: 'unit of the angles of delimited text', commands: OPENING },
  up: {
    value: UPS.join('|'),
    help: 'which axis points up, where the file is silent: shown and reported',
    commands: SURVEYING,
  },
  hand: {
    value: 'right|left',
    help: 'handedness of the axes, where the file is silent',
    commands: SURVEYING,
  },
  space: {
    value: 'parent|world',
    help: 'in whose axes the orientations are; "change space" turns one into the other',
    commands: SURVEYING,
  },
  fps: {
    value: 'N',
    help: 'frames per second of every clip, instead of those found',
    commands: SURVEYING,
  },
  time: {
    value: TIME_FORMS.join('|'),
    help: 'how text writes times: seconds (default), frames, or hh:mm:ss:ff, drop-frame at 29.97',
    commands: REPORTING,
  },
  matrix: {
    help: 'worst speed and departure by playback and tick rate, of each track in JSON',
    commands: ['survey'],
  },
  ticks: {
    value: 'N,…',
    help: `ticks a second that --matrix looks at (default ${USUAL_TICKS.join(',')})`,
    commands: ['survey'],
  },
  reading: {
    value: TICK_READINGS.join('|'),
    help: "what a program reads at a tick of --matrix: the playback's own curve (default), the arc between the keys beside it, the nearest key",
    commands: ['survey'],
  },
  storage: {
    value: 'MODEL',
    help: `how a program stores the file again before --matrix plays it: ${STORAGE_MODELS.filter((model) => !model.startsWith('smallest')).join(', ')}, smallest-three-8 to -16`,
    commands: ['survey'],
  },
  loop: {
    value: 'PATTERN',
    help: 'clips that repeat: their seam is looked at (* stands for anything; again for more)',
    commands: SURVEYING,
  },
  card: { value: 'FILE', help: 'job card to run (JSON)', commands: ['mend', 'docket'] },
  proposed: { help: 'run the remedy of every finding at or above --fail-at', commands: MENDING },
  allow: {
    value: 'VERB',
    help: 'let --proposed use a verb that needs asking for (again for more)',
    commands: MENDING,
  },
  'in-place': { help: 'write over FILE and keep the original beside it', commands: MENDING },
  'dry-run': { help: 'say what would change, write nothing', commands: MENDING },
  'card-out': { value: 'FILE', help: 'write the steps that were run as a job card', commands: MENDING },
  'undo-out': { value: 'FILE', help: 'write the plan that takes the change back', commands: MENDING },
  undo: { value: 'PLAN', help: 'take back a change: run a plan from --undo-out', commands: MENDING },
  baseline: { value: 'FILE', help: 'what was found before and is no news', commands: REPORTING },
  'baseline-out': { value: 'FILE', help: 'write what is found as a baseline', commands: REPORTING },
  'baseline-exact': {
    help: 'fail also where the baseline knows what is found no more',
    commands: REPORTING,
  },
  stamp: {
    value: 'FINGERPRINT|RULE',
    help: 'accept what goes by it in FILE, with --reason: written into FILE.stamps.json (again for more)',
    commands: ['check'],
  },
  reason: { value: 'TEXT', help: 'why it is accepted', commands: ['check'] },
  by: { value: 'NAME', help: 'who accepts it (default: the name you are logged in by)', commands: ['check'] },
  'allow-no-match': { help: 'let a folder or a pattern have nothing for us', commands: REPORTING },
  workers: {
    value: 'N',
    help: 'threads to survey files with (default: one for each core where it pays)',
    commands: REPORTING,
  },
  shard: {
    value: 'I/N',
    help: "survey the I-th of N parts of the files; the parts' JSON reports go to --merge",
    commands: REPORTING,
  },
  merge: { help: 'FILEs are JSON reports: print them as one, and judge them as one', commands: REPORTING },
  angle: { value: 'DEG', help: 'largest angle between the two that passes', commands: ['compare'] },
  rate: {
    value: 'DEG_PER_S',
    help: 'largest difference of speed that passes, as mean over each stored key interval',
    commands: ['compare'],
  },
});

/** What was typed: files and flags, as text. */
export interface Arguments {
  readonly words: readonly string[];
  /** The value of a flag that was given once. */
  value(flag: FlagName): string | undefined;
  /** All values of a flag that may be given again. */
  values(flag: FlagName): readonly string[];
  given(flag: FlagName): boolean;
}

/**
 * Read the words after the command's name.
 *
 * @throws SlewcurveError `usage.unknown-flag`, `usage.bad-value`
 */
export function readArguments(command: CommandName, argv: readonly string[]): Arguments {
  const known = flagsOf(command);
  const unknown = argv
    .slice(0, endOfFlags(argv))
    .find((word) => isFlag(word) && !known.some((name) => name === flagName(word)));
  if (unknown !== undefined) throw unknownFlag(command, unknown, known);
  const options = Object.fromEntries(
    known.map((name) => [
      name,
      {
        type: isSwitch(name) ? ('boolean' as const) : ('string' as const),
        multiple: true,
        ...(name === 'o' && { short: 'o' }),
      },
    ]),
  );
  try {
    const { values, positionals } = parseArgs({ args: [...argv], options, allowPositionals: true });
    const texts = (flag: FlagName): string[] => [values[flag] ?? []].flat().map(String);
    return {
      words: positionals,
      value: (flag) => texts(flag).at(-1),
      values: texts,
      given: (flag) => flag in values,
    };
  } catch (cause) {
    throw new SlewcurveError(
      'usage.bad-value',
      `${messageOf(cause)} Try slewcurve ${command} --help.`,
      {},
      { cause },
    );
  }
}

/** The flags of a command, one line each, for its help. */
export function flagHelp(command: CommandName): string {
  const rows = flagsOf(command).map((name) => {
    const flag = FLAGS[name];
    const value = flag.valueFor?.[command] ?? flag.value;
    return {
      left: `${name === 'o' ? '-o' : `--${name}`}${value === undefined ? '' : ` ${value}`}`,
      help: flag.help,
    };
  });
  const width = Math.max(...rows.map(({ left }) => left.length));
  return rows.map(({ left, help }) => `  ${left.padEnd(width)}  ${help}`).join('\n');
}

function flagsOf(command: CommandName): FlagName[] {
  return Object.keys(FLAGS)
    .filter(isFlagName)
    .filter((name) => FLAGS[name].commands.includes(command));
}

function isSwitch(name: FlagName): boolean {
  return FLAGS[name].value === undefined;
}

function endOfFlags(argv: readonly string[]): number {
  const at = argv.indexOf('--');
  return at < 0 ? argv.length : at;
}

function isFlag(word: string): boolean {
  return /^--?[a-z]/.test(word);
}

function flagName(word: string): string {
  return word.replace(/^--?/, '').replace(/=.*/s, '');
}

function isFlagName(name: string): name is FlagName {
  return Object.hasOwn(FLAGS, name);
}

function unknownFlag(command: CommandName, word: string, known: readonly FlagName[]): SlewcurveError {
  const name = flagName(word);
  const nearest = nearestWord(name, known);
  const elsewhere = isFlagName(name) ? ` It belongs to ${FLAGS[name].commands.join(', ')}.` : '';
  const hint = nearest === undefined ? '' : ` Did you mean --${nearest}?`;
  return new SlewcurveError(
    'usage.unknown-flag',
    `slewcurve ${command} knows no flag ${word.replace(/=.*/s, '')}.${elsewhere || hint} Try slewcurve ${command} --help.`,
  );
}
