import type { RotationTrack, SceneNode } from '@slewcurve/core';
import { roleIn, type HouseRules } from '@slewcurve/survey';

/** Roles of things by which somebody can be hurt or made ill. */
export type CautionRole = 'machine' | 'camera-headset';

/** What to mind before a motion is played on one of them. */
export interface Caution {
  readonly role: CautionRole;
  /** Tracks of that role. */
  readonly tracks: number;
  readonly message: string;
}

const MESSAGES: Readonly<Record<CautionRole, string>> = {
  machine:
    "Check limits and stops against the maker's data and local rules, by a licensed or responsible operator, at reduced speed first. No figure here calls a motion safe.",
  'camera-headset':
    'Comfort numbers are guidance, not a standard: speeds above them are marked, and none is called safe.',
};

/** The cautions for a file's tracks, one a role. */
export function cautionsOf(
  tracks: readonly RotationTrack[],
  nodes: readonly SceneNode[],
  house: HouseRules,
): Caution[] {
  const roles = tracks.map((track) => roleIn(house, track, nodes));
  return cautionsFor((role) => roles.filter((other) => other === role).length);
}

/** The cautions of several files as one list. */
export function mergedCautions(files: readonly { readonly cautions?: readonly Caution[] }[]): Caution[] {
  const all = files.flatMap(({ cautions = [] }) => cautions);
  return cautionsFor((role) =>
    all.reduce((sum, caution) => (caution.role === role ? sum + caution.tracks : sum), 0),
  );
}

function cautionsFor(count: (role: CautionRole) => number): Caution[] {
  return (['machine', 'camera-headset'] as const).flatMap((role) =>
    count(role) > 0 ? [{ role, tracks: count(role), message: MESSAGES[role] }] : [],
  );
}
