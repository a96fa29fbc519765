import { sayRate, saySpan, sayTime } from '../chart/quantity.js';
import {
  outToKeys,
  sayable,
  signed,
  stepsOfKey,
  tidy,
  toRadians,
  type Ground,
  type Hand,
  type HandEdit,
  type Place,
} from './hand.js';
import type { HandLaw } from './pace-sketch.js';

/** The numbers of a press: the speed made greater or less at one time, with soft shoulders. Seconds, deg/s. */
export interface PressNumbers {
  readonly at: number;
  readonly by: number;
  readonly reach: number;
  readonly ends: 'same' | 'run' | 'go';
  /** Seconds over which borrowing fades in at the ends of the span. */
  readonly shoulders?: number | undefined;
  /** Where angle may be borrowed. */
  readonly span: readonly [number, number];
}

/** Reaches of a press between which the rest of its span lies, where nobody chose a span. */
const LENDERS = 3;

/** A press that presses nothing yet. */
export function pressAt(
  ground: Ground,
  time: number,
  reach: number = ground.reach,
  shoulders?: number,
): Hand {
  const held = Math.min(ground.motion.end, Math.max(ground.motion.start, time));
  const at = tidy(held, Math.min(1e-3, ground.frame));
  const span = spanAround(ground, at, reach);
  return press(ground, { at, by: 0, reach, ends: ground.ends, shoulders, span });
}

/** A press as its numbers say. */
export function press(ground: Ground, numbers: PressNumbers): Hand {
  const { at, by, reach, ends, span, shoulders } = numbers;
  const law: HandLaw | undefined =
    by === 0
      ? undefined
      : ends === 'go'
        ? { kind: 'free', at, by: toRadians(by), reach, span }
        : {
            kind: 'press',
            at,
            by: toRadians(by),
            reach,
            ends,
            span,
            ...(shoulders !== undefined && { shoulders }),
          };
  const edit: HandEdit = {
    verb: 'shape',
    at,
    by,
    reach,
    ends,
    span: sayable(span),
    ...(shoulders !== undefined && { shoulders }),
  };
  const pressed = (more: Partial<PressNumbers>): Hand => press(ground, { ...numbers, ...more });
  return {
    kind: 'press',
    time: at,
    stands: 'trace',
    law,
    edit,
    label: `Speed pressed at ${sayTime(at)}`,
    says: `${signed(by, (size) => sayRate(size))} at ${sayTime(at)}, reaching ${saySpan(reach)}`,
    tag: signed(by, (size) => sayRate(size)),
    amount: by,
    dragged: (from: Place, to: Place) =>
      pressed({ by: tidy(by + to.speed - from.speed, ground.pixel.speed) }),
    nudged(key) {
      const [across, up] = stepsOfKey(key);
      if (up !== 0) return pressed({ by: tidy(by + up, 0.1) });
      if (across !== 0) return moved(ground, numbers, at + across * ground.frame);
      const wider = { '+': 1, '=': 1, '-': -1, '−': -1 }[key.key];
      if (wider === undefined || key.ctrlKey || key.metaKey) return undefined;
      const next = Math.max(ground.frame, tidy(reach + wider * ground.frame, 1e-3));
      return pressed({ reach: next, ...(!ground.span && { span: spanAround(ground, at, next) }) });
    },
  };
}

/** The same press at another time; its span goes with it where nobody chose one. */
function moved(ground: Ground, numbers: PressNumbers, time: number): Hand {
  const { motion } = ground;
  const at = tidy(Math.min(motion.end, Math.max(motion.start, time)), 1e-3);
  return press(ground, { ...numbers, at, span: spanAround(ground, at, numbers.reach) });
}

/** The chosen span where the press stands in it, else as far again as it reaches on either side, out to keys. */
function spanAround(ground: Ground, at: number, reach: number): readonly [number, number] {
  const { span } = ground;
  if (span && at >= span[0] && at <= span[1]) return outToKeys(ground, span);
  return outToKeys(ground, [at - LENDERS * reach, at + LENDERS * reach]);
}
