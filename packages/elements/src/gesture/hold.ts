import { saySpan, sayTime } from '../chart/quantity.js';
import { stepsOfKey, tidy, wholeSpan, type Ground, type Hand, type Place } from './hand.js';

/** The numbers of a hold. Seconds. */
export interface HoldNumbers {
  readonly at: number;
  readonly seconds: number;
  readonly shoulders: number;
}

/** A hold of half a second with soft shoulders, as far as there is room for them. */
export function holdAt(ground: Ground, time: number): Hand {
  const [from, to] = wholeSpan(ground);
  const at = tidy(Math.min(to, Math.max(from, time)), Math.min(1e-3, ground.frame));
  const room = Math.min(at - from, to - at);
  return hold(ground, { at, seconds: 0.5, shoulders: Math.max(0, tidy(Math.min(0.2, room), 1e-3)) });
}

/** A hold as its numbers say; its handle stands at its end and sets how long it lasts. */
export function hold(ground: Ground, numbers: HoldNumbers): Hand {
  const { at, seconds, shoulders } = numbers;
  const lasting = (next: number): Hand =>
    hold(ground, { ...numbers, seconds: Math.max(ground.frame, tidy(next, Math.min(0.01, ground.frame))) });
  return {
    kind: 'hold',
    time: at,
    stands: 'baseline',
    later: seconds,
    law: { kind: 'hold', at, seconds, shoulders, span: wholeSpan(ground) },
    edit: { verb: 'hold', at, seconds, ...(shoulders > 0 && { shoulders }) },
    label: `Hold at ${sayTime(at)}`,
    says: `stands still for ${saySpan(seconds)}`,
    tag: `${saySpan(seconds)} still`,
    amount: seconds,
    dragged: (from: Place, to: Place) => lasting(seconds + to.time - from.time),
    nudged(key) {
      const [across] = stepsOfKey(key);
      return across === 0
        ? undefined
        : hold(ground, { ...numbers, seconds: nudgedTo(seconds + across * ground.frame, ground) });
    },
  };
}

function nudgedTo(seconds: number, { frame }: Ground): number {
  return Math.max(tidy(frame, 1e-3), tidy(seconds, 1e-3));
}
