import { html, nothing, type TemplateResult } from 'lit';
import { easeOf } from '@slewcurve/mend';
import type { HandEdit } from '../gesture/hand.js';
import { valueOf } from '../theme/value-of.js';
import type { ChartData } from './chart-data.js';
import { keyNumbers } from './key-numbers.js';
import { sayAngle, sayNumber, sayRate, saySpan } from './quantity.js';

/** An ease as people choose it, and as the job card writes it. */
interface EaseChoice {
  readonly says: string;
  readonly ease: string;
}

const EASES: readonly EaseChoice[] = [
  { says: 'constant', ease: 'constant' },
  { says: '3u² − 2u³', ease: 'cubic' },
  { says: 'minimum jerk', ease: 'minimum-jerk' },
  { says: 'half cosine', ease: 'half-cosine' },
  { says: 'cycloid', ease: 'cycloid' },
  { says: 'trapezoid, ramps of 0.3', ease: 'trapezoid 0.3' },
  { says: 'S-curve, ramps of 0.3', ease: 's-curve 0.3' },
  { says: 'CSS ease', ease: 'cubic-bezier(0.25, 0.1, 0.25, 1)' },
  { says: 'CSS ease-in-out', ease: 'cubic-bezier(0.42, 0, 0.58, 1)' },
];

/** How the segment after a key is played: what can be chosen, and what it costs, told before it is taken. */
export function segmentWords(
  data: ChartData,
  key: number,
  chosen: string,
  events: { choose(ease: string): void; take(edit: HandEdit): void },
): TemplateResult | typeof nothing {
  const { after } = keyNumbers(data, key);
  if (!after) return nothing;
  const span = [data.keys[key], data.keys[key + 1]] as const;
  const way = (edit: HandEdit, says: string): TemplateResult =>
    html`<button class="plain" @click=${() => events.take(edit)}>${says}</button>`;
  return html`<section class="segment" aria-label=${`From key ${key} to key ${key + 1}`}>
    <label
      >from key ${key} to ${key + 1}, ease by
      <select @change=${(event: Event) => events.choose(valueOf(event))}>
        ${EASES.map(
          ({ says, ease }) => html`<option value=${ease} ?selected=${ease === chosen}>${says}</option>`,
        )}
      </select></label
    >
    ${way({ verb: 'ease in/out', ease: chosen, span }, 'Ease it so')}
    ${after.angle > MIDDLE ? sides(data, key, way) : nothing}
    ${way({ verb: 'whole turns', keys: [key + 1], turns: 1 }, 'Add a whole turn')}
    ${way({ verb: 'ease through' }, 'Run a spline through all keys')}
    <p>${peakWords(chosen, after.angle, after.gap)}</p>
  </section>`;
}

/** Below this angle, degrees, nobody asks which way round. */
const MIDDLE = 90;

/** Short way and long way, about the turn's own axis and against it. */
function sides(
  { motion, keys }: ChartData,
  key: number,
  way: (edit: HandEdit, says: string) => TemplateResult,
): TemplateResult | typeof nothing {
  const { own, speed } = motion.read(keys[key] + (keys[key + 1] - keys[key]) / 2);
  if (!(speed > 0)) return nothing;
  const axis = own.map((rate) => Number((rate / speed).toFixed(6)));
  const side = (sign: 1 | -1): HandEdit => ({
    verb: 'choose side',
    keys: [key + 1],
    axis: [sign * axis[0], sign * axis[1], sign * axis[2]],
  });
  return html`${way(side(1), 'Keep this way round')} ${way(side(-1), 'Go the other way round')}`;
}

/** "Turns 9° in 33 ms: up to 506 deg/s and 46,800 deg/s²; the speed jumps at its ends." */
function peakWords(name: string, angle: number, seconds: number): string {
  const { peakSpeed, peakAcceleration, jumps } = easeOf(name);
  const jump = jumps === 'none' ? '' : `; the ${jumps} jumps`;
  return `Turns ${sayAngle(angle)} in ${saySpan(seconds)}: up to ${sayRate((peakSpeed * angle) / seconds)} and ${sayNumber((peakAcceleration * angle) / seconds ** 2)} deg/s²${jump}.`;
}
