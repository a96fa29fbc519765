import { html, nothing, type TemplateResult } from 'lit';
import type { KeyNumbers } from './key-numbers.js';
import { sayAngle, sayNumber, sayRate, saySpan, sayTime } from './quantity.js';

/** The numbers of one key, beside the close-up. */
export function keyWords(numbers: KeyNumbers, playback: string): TemplateResult {
  const { speedIn, speedOut, before, after } = numbers;
  return html`<div>
    <h4>Key ${numbers.key}, ${sayTime(numbers.time)}</h4>
    <dl>
      ${line('orientation', `${sayAngle(numbers.angle, 4)} about ${numbers.axis.map((v) => sayNumber(v)).join(', ')} (parent)`)}
      ${line('as a quaternion x, y, z, w', numbers.orientation.map((v) => sayNumber(v, 5)).join(', '))}
      ${speedIn === undefined ? nothing : line('speed just before', sayRate(speedIn, 4))}
      ${speedOut === undefined ? nothing : line('speed just after', sayRate(speedOut, 4))}
      ${before ? line('from the key before', `${sayAngle(before.angle)} in ${saySpan(before.gap)}`) : nothing}
      ${after ? line('to the key after', `${sayAngle(after.angle)} in ${saySpan(after.gap)}`) : nothing}
      ${line('played', playback)}
    </dl>
  </div>`;
}

function line(term: string, words: string): TemplateResult {
  return html`<div>
    <dt>${term}</dt>
    <dd>${words}</dd>
  </div>`;
}
