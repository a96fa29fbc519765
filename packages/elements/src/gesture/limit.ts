import { sayRate } from '../chart/quantity.js';
import {
  outToKeys,
  sayable,
  stepsOfKey,
  tidy,
  toRadians,
  wholeSpan,
  type Ground,
  type Hand,
  type Place,
} from './hand.js';

/** A limit line at a speed, deg/s: what stands above it is pressed flat, and time grows. Over the chosen span, else over the whole track. */
export function limitAt(ground: Ground, time: number, speed: number): Hand {
  const rate = Math.max(least(ground), tidy(speed, ground.pixel.speed));
  const span = ground.span ? outToKeys(ground, ground.span) : wholeSpan(ground);
  const isPassed = ground.motion.columns(span[0], span[1], 1).greatest[0] > rate;
  const at = (next: number): Hand => limitAt(ground, time, next);
  return {
    kind: 'limit',
    time,
    stands: { speed: rate },
    law: isPassed ? { kind: 'cap', rate: toRadians(rate), span } : undefined,
    edit: { verb: 'cap', rate, ...(ground.span && { span: sayable(span) }) },
    label: 'Limit of the speed',
    says: `at most ${sayRate(rate)}`,
    tag: `at most ${sayRate(rate)}`,
    amount: rate,
    dragged: (from: Place, to: Place) => at(rate + to.speed - from.speed),
    nudged(key) {
      const [, up] = stepsOfKey(key);
      return up === 0
        ? undefined
        : limitAt({ ...ground, pixel: { ...ground.pixel, speed: 1 } }, time, rate + up);
    },
  };
}

/** Lower than what a pixel stands for no limit is drawn: at no speed nothing would ever arrive. */
function least({ pixel }: Ground): number {
  return 10 ** Math.floor(Math.log10(pixel.speed > 0 ? pixel.speed : 1) + 1e-9);
}
