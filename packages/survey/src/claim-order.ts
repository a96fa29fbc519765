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
  ['pace.reverse'],
];

/** Tangents this much too short, times, stop at their keys; longer ones are of a wrong scale. */
const NONE = 0.01;

/** Where this is found the whole track is explained: repeats, tremble and pace are the storage's. Jumps beyond its floor are not. */
const CLAIMS_ALL = 'file.coarse';
const CLAIMED = /^(?:jump\.freeze|shake\..*|pace\..*)$/;

/** Keys on either side of a place's own that belong to its spot. */
const SPOT = 3;

/** One spot, one finding: what a rule found, less the places at spots that a rule before it in the claim order has taken. */
export function claimSpots(all: readonly Found[]): Found[] {
  const isClaimed = all.some(({ rule }) => rule.id === CLAIMS_ALL);
  const beaten = tangentsOrPearls(all);
  const found = all.filter(({ rule }) => !(isClaimed && CLAIMED.test(rule.id)) && rule.id !== beaten);
  const claims = found
    .flatMap(({ rule, places }) => places.map((place) => ({ rank: rankOf(rule), place })))
    .filter(({ rank }) => rank >= 0);
  claims.sort((a, b) => a.rank - b.rank || (b.place.confidence ?? 0) - (a.place.confidence ?? 0));
  const taken = new Set<number>();
  const lost = new Set<Place>();
  for (const { place } of claims)
    if (place.keys.some((key) => spotOf(key).some((other) => taken.has(other)))) lost.add(place);
    else for (const key of place.keys) taken.add(key);
  return found.map(({ rule, places }) => ({ rule, places: places.filter((place) => !lost.has(place)) }));
}

/** The weaker of two explanations of a move that stops at its keys; undefined where there is one alone. */
function tangentsOrPearls(all: readonly Found[]): string | undefined {
  const scale = all.find(({ rule }) => rule.id === 'pace.tangent-scale')?.places[0];
  if (scale === undefined || !all.some(({ rule }) => rule.id === 'pace.pearls')) return undefined;
  return scale.value < NONE ? 'pace.tangent-scale' : 'pace.pearls';
}

/** -1 where the order does not name the rule. */
function rankOf(rule: Rule): number {
  return ORDER.findIndex((line) => line.includes(rule.id));
}

function spotOf(key: number): number[] {
  return Array.from({ length: 2 * SPOT + 1 }, (_, i) => key + i - SPOT);
}
