import { SlewcurveError } from '@slewcurve/core';
import { parseStamps, type Stamp } from '@slewcurve/job';
import { parseHouseRules, type HouseRules } from '@slewcurve/survey';
import { readJson, type ChosenRecord } from '../files/record.js';

/** House rules, and the file that they stand in. */
export interface NamedHouseRules {
  readonly name: string;
  readonly rules: HouseRules;
}

/** Stamps, and the file that they stand in. */
export interface NamedStamps {
  readonly path: string;
  readonly stamps: readonly Stamp[];
}

/** What was read of some records; what can't be read says so, and the rest holds. */
interface ReadRecords {
  /** The last of them. */
  readonly house?: NamedHouseRules;
  readonly stamps: readonly NamedStamps[];
  /** What is wrong, with its code. */
  readonly problems: readonly string[];
}

export async function readRecords(records: readonly ChosenRecord[]): Promise<ReadRecords> {
  let house: NamedHouseRules | undefined;
  const stamps: NamedStamps[] = [];
  const problems: string[] = [];
  for (const record of records) {
    const { path } = record;
    try {
      const json = await readJson(record);
      if (record.kind === 'house rules') house = { name: baseName(path), rules: parseHouseRules(json) };
      else stamps.push({ path, stamps: parseStamps(json, path) });
    } catch (error) {
      problems.push(problemOf(path, error));
    }
  }
  return { stamps, problems, ...(house && { house }) };
}

/** The last part of a path. */
export function baseName(path: string): string {
  return path.slice(path.lastIndexOf('/') + 1);
}

function problemOf(path: string, error: unknown): string {
  const message = error instanceof Error ? error.message : String(error);
  const named = message.includes(path) ? message : `${path}: ${message}`;
  return error instanceof SlewcurveError ? `${named} (${error.code})` : named;
}
