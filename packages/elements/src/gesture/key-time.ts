import { sayTime } from '../chart/quantity.js';
import { sayable, stepsOfKey, tidy, type Ground, type Hand, type Place } from './hand.js';

/** A key moves no nearer to its neighbour than this share of the gap that was. */
const ROOM = 0.05;

/**
 * A key's post drawn sideways: the key travels, its value stays, between its neighbours, which stay where they are. Undefined for the first and last keys, which have a neighbour on one side alone.
 */
export function keyTime(ground: Ground, key: number, time: number = ground.keys[key]): Hand | undefined {
  const { keys } = ground;
  if (!(key > 0 && key < keys.length - 1)) return undefined;
  const [before, old, after] = [keys[key - 1], keys[key], keys[key + 1]];
  const held = Math.min(after - ROOM * (after - old), Math.max(before + ROOM * (old - before), time));
  const next = tidy(held, Math.min(1e-3, ground.frame / 10));
  const span = [before, after] as const;
  const changed = Math.abs(next - old) > 1e-9;
  const at = (to: number): Hand => keyTime(ground, key, to) ?? hand;
  const hand: Hand = {
    kind: 'retime',
    time: old,
    stands: 'baseline',
    law: changed ? { kind: 'moved', old, time: next, span } : undefined,
    edit: { verb: 'set marks', marks: [[tidy(old, 1e-4), next]], store: 'move', span: sayable(span) },
    label: `Time of key ${key}`,
    says: sayTime(next),
    tag: sayTime(next),
    amount: next,
    dragged: (from: Place, to: Place) => at(next + to.time - from.time),
    nudged(press) {
      const [across] = stepsOfKey(press);
      return across === 0 ? undefined : at(next + across * ground.frame);
    },
  };
  return hand;
}
