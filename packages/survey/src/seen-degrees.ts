import type { Place, Rule } from './rule.js';

/** Families whose values in degrees are how far a thing stands off where it should. */
const OFFSETS: readonly string[] = ['jump', 'shake', 'seam'];
/** Rules of other families whose values are that too. */
const OTHERS: readonly string[] = ['pace.overrun', 'pace.reverse'];

/** How far, in degrees, a place is seen to stand off; undefined where its value says nothing of that. */
export function seenDegrees({ id, family, unit }: Rule, { value, facts }: Place): number | undefined {
  // A hum is told in hertz.
  if (id === 'shake.hum') return facts?.['amplitude'];
  return unit === 'deg' && (OFFSETS.includes(family) || OTHERS.includes(id)) ? value : undefined;
}
