import type { PlaybackId, RotationTrack, SceneNode } from '@slewcurve/core';
import { matchesPattern } from '@slewcurve/mend';
import type { Level } from './finding.js';
import { type Role, roleOf } from './roles.js';
import type { Limits, RoleLimits, Rule } from './rule.js';

/** A level by decree; `off` silences. */
export type LevelSetting = Level | 'off';

/** A threshold by decree: a number stands for the rule's first one. */
export type LimitSetting = number | Limits | 'off';

/** By role, `*` for all of them; then by rule id. */
export type LimitTable = Readonly<Partial<Record<Role | '*', Readonly<Record<string, LimitSetting>>>>>;

/** Which file, clip and track something holds for: patterns in which `*` stands for anything; left out: every one. */
export interface Where {
  readonly file?: string;
  readonly clip?: string;
  readonly track?: string;
}

/** Thresholds and levels that hold in some places only; later ones win. */
export interface Exception {
  readonly where: Where;
  readonly limits?: LimitTable;
  readonly levels?: Readonly<Record<string, LevelSetting>>;
}

/** What people say a file means to do. Clip and track are patterns. */
export interface Declared {
  /** The step into the key at this time, seconds, is a cut. */
  readonly cuts: readonly { readonly clip: string; readonly track: string; readonly time: number }[];
  readonly holds: readonly DeclaredSpan[];
  readonly whips: readonly DeclaredSpan[];
  readonly spins: readonly { readonly clip: string; readonly track: string; readonly rpm: number }[];
  readonly marks: readonly { readonly clip: string; readonly time: number; readonly name: string }[];
  /** One clip runs on into another, without a transition. */
  readonly joins: readonly { readonly from: string; readonly to: string; readonly track: string }[];
  /** Clips that are mixed with each other, both from their starts. */
  readonly blends: readonly { readonly clips: readonly string[]; readonly track: string }[];
}

/** A stretch of a track that is meant as it is. Seconds of the file's own clock. */
export interface DeclaredSpan {
  readonly clip: string;
  readonly track: string;
  readonly span: readonly [number, number];
}

/** Limits, levels and exceptions of a project: its `house-rules.json`, checked. */
export interface HouseRules {
  /** By pattern of the node path; the first that fits counts. */
  readonly roles: Readonly<Record<string, Role>>;
  readonly limits: LimitTable;
  readonly levels: Readonly<Record<string, LevelSetting>>;
  readonly exceptions: readonly Exception[];
  /** Patterns of clips that repeat. */
  readonly loops: readonly string[];
  readonly declared: Declared;
  /** How the files will be played; empty: nothing said. */
  readonly playback: readonly PlaybackId[];
  /** Patterns of files that are not looked at. */
  readonly leaveOut: readonly string[];
}

/** A project that decrees nothing. */
export const NO_HOUSE_RULES: HouseRules = Object.freeze({
  roles: {},
  limits: {},
  levels: {},
  exceptions: [],
  loops: [],
  declared: { cuts: [], holds: [], whips: [], spins: [], marks: [], joins: [], blends: [] },
  playback: [],
  leaveOut: [],
});

/** A track's address, for patterns. */
export interface Address {
  readonly file: string;
  readonly clip: string;
  readonly track: string;
}

/** The rule's thresholds for a role at an address: the defaults, then the house's, then each exception's; undefined where off. */
export function limitsAt(house: HouseRules, rule: Rule, role: Role, address: Address): Limits | undefined {
  let limits: RoleLimits = rule.limits[role];
  for (const table of [house.limits, ...exceptionsAt(house, address).map((exception) => exception.limits)])
    for (const setting of [table?.['*']?.[rule.id], table?.[role]?.[rule.id]]) {
      if (setting === undefined) continue;
      limits = overridden(limits, setting, rule);
    }
  return limits === 'off' ? undefined : limits;
}

function overridden(limits: RoleLimits, setting: LimitSetting, rule: Rule): RoleLimits {
  if (setting === 'off') return 'off';
  const names = Object.keys(Object.values(rule.limits).find((entry) => entry !== 'off') ?? {});
  // A role that was spared takes the other thresholds from the joint's, the commonest role.
  const base = limits === 'off' ? rule.limits.joint : limits;
  const changed = typeof setting === 'number' ? { [names[0] ?? 'size']: setting } : setting;
  return { ...(base === 'off' ? {} : base), ...changed };
}

/** The level that the house gives a rule at an address; undefined where it says nothing. */
export function levelAt(house: HouseRules, rule: string, address: Address): LevelSetting | undefined {
  let level = house.levels[rule];
  for (const exception of exceptionsAt(house, address)) level = exception.levels?.[rule] ?? level;
  return level;
}

function exceptionsAt(house: HouseRules, address: Address): readonly Exception[] {
  if (house.exceptions.length === 0) return house.exceptions;
  return house.exceptions.filter(
    ({ where }) =>
      matchesPattern(where.file ?? '*', address.file) &&
      matchesPattern(where.clip ?? '*', address.clip) &&
      matchesPattern(where.track ?? '*', address.track),
  );
}

/** The role of a track's node: what the house says, or else its node. */
export function roleIn(house: HouseRules, track: RotationTrack, nodes: readonly SceneNode[]): Role {
  return roleAt(house, track.id) ?? roleOf(track, nodes);
}

/** The role that the house gives a node path; undefined where it says nothing. */
function roleAt(house: HouseRules, path: string): Role | undefined {
  return Object.entries(house.roles).find(([pattern]) => matchesPattern(pattern, path))?.[1];
}
