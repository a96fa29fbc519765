// RULES "Local roughness" and "Explanations compete", for even key gaps (all dense tracks of the demo have them).
import type { Track } from './read-scene.js';
import { closes } from './seams.js';
import { size, turnVector, weighted, type Vec } from './turns.js';

export interface Claim {
  readonly kind: 'lone key' | 'shelf' | 'corner';
  readonly key: number;
  /** Degrees. */
  readonly size: number;
  readonly gain: number;
  /** Its gain over the best rival explanation within one key. */
  readonly lead: number;
}

const PATTERNS = {
  'lone key': { '-2': 1, '-1': -4, 0: 6, 1: -4, 2: 1 },
  shelf: { '-2': 1, '-1': -3, 0: 3, 1: -1 },
  corner: { '-1': 1, 0: -2, 1: 1 },
} as const;
const KINDS = ['lone key', 'shelf', 'corner'] as const;
const DIFFERENCE = [1, -4, 6, -4, 1];

/** Fourth differences around `key`, by position -4 to 4; what reaches past an end is left out. Degrees. */
export function fourthDifferences(track: Track, key: number): Map<number, Vec> {
  const found = new Map<number, Vec>();
  const { keys } = track;
  const period = closes(track) ? keys.length - 1 : 0;
  const at = (j: number): Vec | undefined => {
    const index = period ? (((key + j) % period) + period) % period : key + j;
    return keys[index] && turnVector(keys[key], keys[index]);
  };
  for (let i = -4; i <= 4; i++) {
    const five = [-2, -1, 0, 1, 2].map((m) => at(i + m));
    if (five.every((y) => y !== undefined))
      found.set(i, weighted(DIFFERENCE.map((weight, m) => [weight, five[m]])));
  }
  return found;
}

/** Explanations that gain most within three keys, with their lead over rivals. */
export function claims(track: Track): Claim[] {
  const all = track.keys.map((_, key) => explain(track, key));
  return all.flatMap((here, key) => {
    const near = (reach: number): Fit[] => all.slice(Math.max(0, key - reach), key + reach + 1).flat();
    const best = Math.max(...near(3).map(({ gain }) => gain));
    return here
      .filter(({ gain }) => gain === best && gain >= 8)
      .map((fit): Claim => {
        const rivals = near(1).filter(({ kind }) => kind !== fit.kind);
        return { ...fit, key, lead: fit.gain / Math.max(...rivals.map(({ gain }) => gain)) };
      });
  });
}

type Fit = Pick<Claim, 'kind' | 'size' | 'gain'>;

function explain(track: Track, key: number): Fit[] {
  const d = fourthDifferences(track, key);
  if (d.size < 7) return [];
  const roughness = [...d.values()].reduce((sum, v) => sum + size(v) ** 2, 0);
  return KINDS.map((kind) => {
    const terms = Object.entries(PATTERNS[kind]).flatMap(([i, weight]): [number, Vec][] => {
      const v = d.get(Number(i));
      return v ? [[weight, v]] : [];
    });
    const squares = terms.reduce((sum, [weight]) => sum + weight * weight, 0);
    const fitted = size(weighted(terms)) / squares;
    const left = Math.max(0, roughness - fitted * fitted * squares);
    return { kind, size: fitted, gain: roughness / (left + 70 * d.size * track.floor ** 2) };
  });
}
