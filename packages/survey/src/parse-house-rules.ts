import { PLAYBACKS, SlewcurveError, type PlaybackId } from '@slewcurve/core';
import { nearestWord } from '@slewcurve/mend';
import {
  NO_HOUSE_RULES,
  type Declared,
  type DeclaredSpan,
  type Exception,
  type HouseRules,
  type LevelSetting,
  type LimitSetting,
  type LimitTable,
  type Where,
} from './house-rules.js';
import { RULES } from './registry.js';
import { ROLES, type Role } from './roles.js';
import type { Rule } from './rule.js';

type Fields = Readonly<Record<string, unknown>>;
type Reader<T> = (value: unknown, at: string) => T;

/**
 * House rules out of JSON.
 *
 * @throws SlewcurveError `house-rules.bad-shape` where something is not what it must be, `house-rules.unknown-key`,
 *   `house-rules.unknown-rule`, `house-rules.unknown-role`, `house-rules.unknown-limit`, `house-rules.unknown-level`,
 *   `house-rules.unknown-playback` where a word is not known; `place.pointer` says where
 */
export function parseHouseRules(json: unknown): HouseRules {
  const fields = record(json, '');
  onlyKeys(fields, Object.keys(NO_HOUSE_RULES), '');
  return {
    roles: map(fields['roles'], '/roles', role),
    limits: limitTable(fields['limits'], '/limits'),
    levels: levels(fields['levels'], '/levels'),
    exceptions: list(fields['exceptions'], '/exceptions', exception),
    loops: list(fields['loops'], '/loops', text),
    declared: declared(fields['declared'], '/declared'),
    playback: playbacks(fields['playback'], '/playback'),
    leaveOut: list(fields['leaveOut'], '/leaveOut', text),
  };
}

function exception(value: unknown, at: string): Exception {
  const fields = record(value, at);
  onlyKeys(fields, ['where', 'limits', 'levels'], at);
  return {
    where: where(fields['where'], `${at}/where`),
    ...(fields['limits'] !== undefined && { limits: limitTable(fields['limits'], `${at}/limits`) }),
    ...(fields['levels'] !== undefined && { levels: levels(fields['levels'], `${at}/levels`) }),
  };
}

function where(value: unknown, at: string): Where {
  const fields = record(value ?? {}, at);
  onlyKeys(fields, ['file', 'clip', 'track'], at);
  return map(fields, at, text);
}

function limitTable(value: unknown, at: string): LimitTable {
  const table: Partial<Record<Role | '*', Readonly<Record<string, LimitSetting>>>> = {};
  for (const [name, entry] of Object.entries(record(value ?? {}, at))) {
    const key = name === '*' ? name : role(name, `${at}/${name}`);
    table[key] = map(entry, `${at}/${name}`, limit);
    for (const rule of Object.keys(table[key])) knownRule(rule, `${at}/${name}/${rule}`);
  }
  return table;
}

function limit(value: unknown, at: string): LimitSetting {
  if (value === 'off') return value;
  if (typeof value === 'number') return threshold(value, at);
  const limits = map(value, at, threshold);
  const id = at.slice(at.lastIndexOf('/') + 1);
  const known = Object.values(knownRule(id, at).limits).flatMap((entry) =>
    entry === 'off' ? [] : Object.keys(entry),
  );
  for (const name of Object.keys(limits)) oneOf(name, [...new Set(known)], 'limit', at);
  return limits;
}

function levels(value: unknown, at: string): Readonly<Record<string, LevelSetting>> {
  const found = map(value, at, (level, place) =>
    oneOf(level, ['off', 'note', 'warning', 'error'] as const, 'level', place),
  );
  for (const rule of Object.keys(found)) knownRule(rule, `${at}/${rule}`);
  return found;
}

function declared(value: unknown, at: string): Declared {
  const fields = record(value ?? {}, at);
  onlyKeys(fields, Object.keys(NO_HOUSE_RULES.declared), at);
  return {
    cuts: list(fields['cuts'], `${at}/cuts`, (entry, place) => ({
      ...target(entry, place),
      time: number(record(entry, place)['time'], `${place}/time`),
    })),
    holds: list(fields['holds'], `${at}/holds`, declaredSpan),
    whips: list(fields['whips'], `${at}/whips`, declaredSpan),
    spins: list(fields['spins'], `${at}/spins`, (entry, place) => ({
      ...target(entry, place),
      rpm: number(record(entry, place)['rpm'], `${place}/rpm`),
    })),
    marks: list(fields['marks'], `${at}/marks`, (entry, place) => ({
      clip: target(entry, place).clip,
      time: number(record(entry, place)['time'], `${place}/time`),
      name: text(record(entry, place)['name'], `${place}/name`),
    })),
    joins: list(fields['joins'], `${at}/joins`, join),
    blends: list(fields['blends'], `${at}/blends`, blend),
  };
}

const join: Reader<Declared['joins'][number]> = (value, at) => {
  const fields = record(value, at);
  onlyKeys(fields, ['from', 'to', 'track'], at);
  return {
    from: text(fields['from'], `${at}/from`),
    to: text(fields['to'], `${at}/to`),
    track: target(value, at).track,
  };
};

const blend: Reader<Declared['blends'][number]> = (value, at) => {
  const fields = record(value, at);
  onlyKeys(fields, ['clips', 'track'], at);
  const clips = list(fields['clips'], `${at}/clips`, text);
  if (clips.length < 2) throw badShape(`${at}/clips`, 'two names of clips or more', fields['clips']);
  return { clips, track: target(value, at).track };
};

function declaredSpan(value: unknown, at: string): DeclaredSpan {
  const span = list(record(value, at)['span'], `${at}/span`, number);
  const [start, end] = span;
  if (span.length !== 2 || start === undefined || end === undefined || end < start)
    throw badShape(`${at}/span`, 'two times in seconds, the later one last', record(value, at)['span']);
  return { ...target(value, at), span: [start, end] };
}

function target(value: unknown, at: string): { clip: string; track: string } {
  const { clip = '*', track = '*' } = record(value, at);
  return { clip: text(clip, `${at}/clip`), track: text(track, `${at}/track`) };
}

function playbacks(value: unknown, at: string): PlaybackId[] {
  const known = Object.values(PLAYBACKS).map((playback) => playback.id);
  const given = typeof value === 'string' ? value.split(',') : value;
  return list(given, at, (id, place) => oneOf(id, known, 'playback', place));
}

const role: Reader<Role> = (value, at) => oneOf(value, ROLES, 'role', at);

const text: Reader<string> = (value, at) => {
  if (typeof value === 'string') return value;
  throw badShape(at, 'text', value);
};

const number: Reader<number> = (value, at) => {
  if (typeof value === 'number' && Number.isFinite(value)) return value;
  throw badShape(at, 'a number', value);
};

/** Below nothing there is nothing to be beyond. */
const threshold: Reader<number> = (value, at) => {
  if (number(value, at) >= 0) return number(value, at);
  throw badShape(at, 'a number from 0 up', value);
};

function oneOf<T extends string>(value: unknown, known: readonly T[], what: string, at: string): T {
  const found = known.find((word) => word === value);
  if (found !== undefined) return found;
  const nearest = typeof value === 'string' ? nearestWord(value, known) : undefined;
  const hint = nearest === undefined ? `There are: ${known.join(', ')}.` : `Did you mean ${nearest}?`;
  throw new SlewcurveError(
    `house-rules.unknown-${what}`,
    `${shown(value)} at ${at || 'the top'} is no ${what}. ${hint}`,
    { pointer: at },
  );
}

function knownRule(id: string, at: string): Rule {
  const ids = RULES.map((rule) => rule.id);
  return RULES[ids.indexOf(oneOf(id, ids, 'rule', at))]!;
}

function record(value: unknown, at: string): Fields {
  if (isRecord(value)) return value;
  throw badShape(at, 'an object', value);
}

function isRecord(value: unknown): value is Fields {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function map<T>(value: unknown, at: string, read: Reader<T>): Readonly<Record<string, T>> {
  return Object.fromEntries(
    Object.entries(record(value ?? {}, at)).map(([key, entry]) => [key, read(entry, `${at}/${key}`)]),
  );
}

function list<T>(value: unknown, at: string, read: Reader<T>): T[] {
  if (value === undefined) return [];
  if (!Array.isArray(value)) throw badShape(at, 'a list', value);
  return value.map((entry: unknown, i) => read(entry, `${at}/${i}`));
}

function onlyKeys(fields: Fields, known: readonly string[], at: string): void {
  for (const key of Object.keys(fields)) oneOf(key, known, 'key', `${at}/${key}`);
}

function badShape(at: string, wanted: string, value: unknown): SlewcurveError {
  return new SlewcurveError(
    'house-rules.bad-shape',
    `${at || 'The top'} of the house rules must be ${wanted}; it is ${shown(value)}.`,
    { pointer: at },
  );
}

function shown(value: unknown): string {
  return value === undefined ? 'left out' : (JSON.stringify(value) ?? typeof value).slice(0, 60);
}
