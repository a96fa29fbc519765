import { sayStep, type Step } from '@slewcurve/mend';
import { remedyButton } from './note-of-finding.js';
import { sayNumber } from './quantity.js';

/** One way to mend a finding: its sentence, and what its button says. */
export interface RemedyWay {
  readonly sentence: string;
  readonly button: string;
}

/** The ways to mend a place, the proposed one first. What tells them apart is said on their buttons: the way round, the side, the spread. */
export function remedyWays(steps: readonly Step[]): readonly RemedyWay[] {
  const buttons = steps.map((step) => remedyButton(step));
  return steps.map((step, i) => {
    const isShared = buttons.some((other, j) => j !== i && other === buttons[i]);
    return { sentence: sayStep(step), button: isShared ? `${buttons[i]}, ${ownWords(step)}` : buttons[i] };
  });
}

function ownWords({ axis, side, spread, fade }: Step): string {
  const words = [
    ...(axis ? [`about ${sayOwnAxis(axis)}`] : []),
    ...(side ? [side === 'own' ? 'on its own side' : 'on the parent’s side'] : []),
    ...(spread ? [spread === 'tail' ? 'over its tail' : 'evenly'] : []),
    ...(fade === undefined ? [] : [`fading over ${sayNumber(fade)} s`]),
  ];
  return words.length > 0 ? words.join(', ') : 'otherwise';
}

/** "own y" where an axis is nearly that, else its numbers. */
function sayOwnAxis(axis: readonly [number, number, number]): string {
  const size = Math.hypot(...axis);
  const index = axis.findIndex((part) => Math.abs(part) > 0.9986 * size);
  if (index < 0) return `(${axis.map((part) => sayNumber(part / size)).join(', ')})`;
  return `${axis[index] < 0 ? 'minus ' : ''}own ${'xyz'[index] ?? ''}`;
}
