import { nearestKey } from '../chart/posts.js';
import { drawingThrough } from './drawing.js';
import type { Ground, Hand, HandEdit } from './hand.js';
import { inToKeys, wholeSpan } from './hand.js';
import { hold } from './hold.js';
import { keyTime } from './key-time.js';
import { limitAt } from './limit.js';
import { press } from './press.js';

/** The hand that makes a step, so that numbers typed into its sentence move the handle; undefined for steps that no hand makes. */
export function handOfEdit(edit: HandEdit, ground: Ground): Hand | undefined {
  switch (edit.verb) {
    case 'shape':
      return pressOf(edit, ground);
    case 'hold':
      return holdOf(edit, ground);
    case 'cap':
      return limitOf(edit, ground);
    case 'set marks':
      return keyTimeOf(edit, ground);
    default:
      return undefined;
  }
}

function pressOf(edit: HandEdit, ground: Ground): Hand | undefined {
  const { at, by, reach, shoulders, ends = 'same', speeds } = edit;
  if (speeds) return drawingThrough(ground, inToKeys(ground, edit.span ?? wholeSpan(ground)), speeds);
  if (at === undefined || by === undefined || reach === undefined) return undefined;
  const span = inToKeys(ground, edit.span ?? wholeSpan(ground));
  return press(ground, { at, by, reach, ends, shoulders, span });
}

function holdOf({ at, seconds, shoulders = 0 }: HandEdit, ground: Ground): Hand | undefined {
  return at === undefined || seconds === undefined ? undefined : hold(ground, { at, seconds, shoulders });
}

function limitOf({ rate, acceleration, span }: HandEdit, ground: Ground): Hand | undefined {
  if (rate === undefined || acceleration !== undefined) return undefined;
  // As fine as it was typed.
  const pixel = { ...ground.pixel, speed: 1e-6 };
  return limitAt({ ...ground, span, pixel }, (span ?? wholeSpan(ground))[0], rate);
}

function keyTimeOf({ marks = [] }: HandEdit, ground: Ground): Hand | undefined {
  const [mark] = marks;
  if (!mark || marks.length > 1) return undefined;
  const key = nearestKey(ground.keys, mark[0]);
  // As fine as a sentence says it.
  return Math.abs(ground.keys[key] - mark[0]) < 1e-3 ? keyTime(ground, key, mark[1]) : undefined;
}
