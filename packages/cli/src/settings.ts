import { readFile } from 'node:fs/promises';
import { resolve } from 'node:path';
import {
  EULER_SEQUENCES,
  PLAYBACKS,
  STORAGE_MODELS,
  SlewcurveError,
  TICK_READINGS,
  type PlaybackId,
} from '@slewcurve/core';
import type { TableOptions } from '@slewcurve/formats';
import { LEVELS, UPS, USUAL_TICKS, type JobSettings, type SaidConventions } from '@slewcurve/job';
import { nearestWord } from '@slewcurve/mend';
import { NO_HOUSE_RULES, ROLES, parseHouseRules, type HouseRules, type Role } from '@slewcurve/survey';
import type { Arguments, FlagName } from './flags.js';
import { messageOf } from './system-error.js';

/**
 * The settings that the flags ask for.
 *
 * @throws SlewcurveError `usage.bad-value`, and what `parseHouseRules` throws
 */
export async function settingsOf(args: Arguments, cwd: string): Promise<JobSettings> {
  const houseRules = await houseRulesOf(args.value('rules'), cwd);
  const roles = rolesOf(args);
  return {
    playbacks: playbacksOf(args) ?? (houseRules.playback.length > 0 ? houseRules.playback : ['as-written']),
    failAt: oneOf(args, 'fail-at', LEVELS) ?? 'warning',
    allowWarnings: wholeNumber(args, 'allow-warnings') ?? 0,
    houseRules: {
      ...houseRules,
      // The first pattern that fits counts: what is said here goes before what the file says.
      roles: { ...roles, ...houseRules.roles, ...roles },
      loops: [...houseRules.loops, ...args.values('loop')],
    },
    ...frameRateOf(args),
    said: saidOf(args),
    ...matrixOf(args),
  };
}

function frameRateOf(args: Arguments): Pick<JobSettings, 'frameRate'> {
  const given = args.value('fps');
  return given === undefined ? {} : { frameRate: perSecond('fps', given) };
}

function saidOf(args: Arguments): SaidConventions {
  const up = oneOf(args, 'up', UPS);
  const hand = oneOf(args, 'hand', ['right', 'left']);
  const space = oneOf(args, 'space', ['parent', 'world']);
  return {
    table: tableOptionsOf(args),
    ...(up !== undefined && { up }),
    ...(hand !== undefined && { hand }),
    ...(space !== undefined && { space }),
  };
}

/** What `--matrix` looks at. @throws SlewcurveError `usage.bad-value` */
function matrixOf(args: Arguments): Pick<JobSettings, 'matrix'> {
  const ticks = args
    .values('ticks')
    .flatMap((value) => value.split(',').map((one) => perSecond('ticks', one)));
  const reading = oneOf(args, 'reading', TICK_READINGS) ?? 'own';
  const storage = oneOf(args, 'storage', STORAGE_MODELS);
  if (!args.given('matrix')) return {};
  return {
    matrix: {
      ticks: ticks.length === 0 ? USUAL_TICKS : [...new Set(ticks)],
      reading,
      ...(storage !== undefined && { storage }),
    },
  };
}

function perSecond(flag: FlagName, text: string): number {
  const value = Number(text);
  if (/^\d+(?:\.\d+)?$/.test(text.trim()) && value > 0 && value <= 1e5) return value;
  throw new SlewcurveError(
    'usage.bad-value',
    `--${flag} takes a number above 0 and up to 100000, per second; got ${text}.`,
  );
}

function rolesOf(args: Arguments): Readonly<Record<string, Role>> {
  return Object.fromEntries(
    args.values('role').map((given) => {
      const at = given.lastIndexOf('=');
      const role = oneOfWords('role', given.slice(at + 1), ROLES);
      return [at < 0 ? '*' : given.slice(0, at), role];
    }),
  );
}

/**
 * What the flags say of a table of delimited text.
 *
 * @throws SlewcurveError `usage.bad-value`
 */
export function tableOptionsOf(args: Arguments): TableOptions {
  const columns = args.value('columns');
  const euler = args.value('euler');
  const unit = oneOf(args, 'unit', ['deg', 'rad']);
  const known: readonly string[] = EULER_SEQUENCES;
  if (euler !== undefined && !known.includes(euler)) throw badValue('euler', euler, known);
  return {
    ...(columns !== undefined && { columns: columns.split(',').map((name) => name.trim()) }),
    ...(euler !== undefined && { euler }),
    ...(unit !== undefined && { unit }),
  };
}

/** The value of a flag that takes one of a few words. */
export function oneOf<T extends string>(
  args: Arguments,
  flag: 'format' | 'fail-at' | 'unit' | 'up' | 'hand' | 'space' | 'time' | 'reading' | 'storage',
  allowed: readonly T[],
): T | undefined {
  const value = args.value(flag);
  return value === undefined ? undefined : oneOfWords(flag, value, allowed);
}

function oneOfWords<T extends string>(flag: FlagName, value: string, allowed: readonly T[]): T {
  const found = allowed.find((word) => word === value);
  if (found === undefined) throw badValue(flag, value, allowed);
  return found;
}

/**
 * Text of a file that the user names.
 *
 * @throws SlewcurveError `file.not-found`
 */
export function readText(path: string, cwd: string): Promise<string> {
  return readFile(resolve(cwd, path), 'utf8').catch((cause: unknown) => {
    throw new SlewcurveError(
      'file.not-found',
      `${path} can't be read: ${messageOf(cause)}.`,
      { file: path },
      { cause },
    );
  });
}

/**
 * JSON of a file that the user names.
 *
 * @throws SlewcurveError `file.not-found`, `file.not-json`
 */
export async function readJson(path: string, cwd: string): Promise<unknown> {
  const text = await readText(path, cwd);
  try {
    return JSON.parse(text);
  } catch (cause) {
    throw new SlewcurveError(
      'file.not-json',
      `${path} is not JSON: ${messageOf(cause)}`,
      { file: path },
      { cause },
    );
  }
}

/** The playbacks that the flags name; undefined where they name none. @throws SlewcurveError `usage.bad-value` */
export function playbacksOf(args: Arguments): readonly PlaybackId[] | undefined {
  const ids = args.values('playback').flatMap((value) => value.split(','));
  const bad = ids.find((id) => !isPlaybackId(id));
  if (bad !== undefined) throw badValue('playback', bad, Object.keys(PLAYBACKS));
  return ids.length === 0 ? undefined : [...new Set(ids.filter(isPlaybackId))];
}

function isPlaybackId(id: string): id is PlaybackId {
  return Object.hasOwn(PLAYBACKS, id);
}

/** A flag's whole number; undefined where it is not given. @throws SlewcurveError `usage.bad-value` */
export function wholeNumber(args: Arguments, flag: FlagName): number | undefined {
  const value = args.value(flag);
  if (value === undefined) return undefined;
  if (/^\d{1,9}$/.test(value)) return Number(value);
  throw new SlewcurveError('usage.bad-value', `--${flag} takes a whole number; got ${value}.`);
}

/**
 * A flag's measure; undefined where it is not given.
 *
 * @throws SlewcurveError `usage.bad-value`
 */
export function measureOf(args: Arguments, flag: 'angle' | 'rate'): number | undefined {
  const value = args.value(flag);
  if (value === undefined) return undefined;
  if (/^\d+(?:\.\d+)?(?:e[+-]?\d+)?$/i.test(value)) return Number(value);
  throw new SlewcurveError('usage.bad-value', `--${flag} takes a number, 0 or more; got ${value}.`);
}

/** House rules of a file; what is wrong in it is told with its name. */
async function houseRulesOf(path: string | undefined, cwd: string): Promise<HouseRules> {
  if (path === undefined) return NO_HOUSE_RULES;
  const json = await readJson(path, cwd);
  try {
    return parseHouseRules(json);
  } catch (cause) {
    if (!(cause instanceof SlewcurveError)) throw cause;
    throw new SlewcurveError(
      cause.code,
      `${path}: ${cause.message}`,
      { ...cause.place, file: path },
      { cause },
    );
  }
}

function badValue(flag: string, value: string, allowed: readonly string[]): SlewcurveError {
  const nearest = nearestWord(value, allowed);
  const hint = nearest === undefined ? '' : ` Did you mean ${nearest}?`;
  return new SlewcurveError('usage.bad-value', `--${flag} takes ${allowed.join(', ')}; got ${value}.${hint}`);
}
