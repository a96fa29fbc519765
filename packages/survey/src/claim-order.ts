import type { Place, Rule } from './rule.js';

/** What a rule found on a track. */
export interface Found {
  readonly rule: Rule;
  readonly places: readonly Place[];
}

/**
 * Rules that explain the same kind of trouble, in the order in which they may claim a spot; those on one line are equals, and the
 * higher confidence wins. A rule that is not named here shares its spots.
 */
const ORDER: readonly (readonly string[])[] = [
  ['jump.cut-smear'],
  ['jump.freeze'],
  ['jump.turned-over'],
  ['jump.first-key'],
  ['jump.shelf', 'jump.lone-key'],
];

/** Where this is found the whole track is explained: repeats, tremble and pace are the storage's. Jumps beyond its floor are not. */
const CLAIMS_ALL = 'file.coarse';
const CLAIMED = /^(?:jump\.freeze|shake\..*|pace\..*)$/;

/** Keys on either side of a place's own that belong to its spot. */
const SPOT = 3;

/** One spot, one finding: what a rule found, less the places at spots that a rule before it in the claim order has taken. */
export function claimSpots(all: readonly Found[]): Found[] {
  const isClaimed = all.some(({ rule }) => rule.id === CLAIMS_ALL);
  const found = all.filter(({ rule }) => !(isClaimed && CLAIMED.test(rule.id)));
  const claims = found
    .flatMap(({ rule, places }) => places.map((place) => ({ rank: rankOf(rule), place })))
    .filter(({ rank }) => rank >= 0);
  claims.sort((a, b) => a.rank - b.rank || (b.place.confidence ?? 0) - (a.place.confidence ?? 0));
  const taken = new Set<number>();
  const beaten = new Set<Place>();
  for (const { place } of claims)
    if (place.keys.some((key) => spotOf(key).some((other) => taken.has(other)))) beaten.add(place);
    else for (const key of place.keys) taken.add(key);
  return found.map(({ rule, places }) => ({ rule, places: places.filter((place) => !beaten.has(place)) }));
}

/** -1 where the order does not name the rule. */
function rankOf(rule: Rule): number {
  return ORDER.findIndex((line) => line.includes(rule.id));
}

function spotOf(key: number): number[] {
  return Array.from({ length: 2 * SPOT + 1 }, (_, i) => key + i - SPOT);
}
