import { sayTime, type TimeForm } from '@slewcurve/core';
import { sayStep } from '@slewcurve/mend';
import type { ReportedFinding } from '../report.js';

/** Where and when: `Hips/Spine/Neck in Walk, 0.633 s`. */
export function sayPlace(finding: ReportedFinding, form?: TimeForm, fps?: number): string {
  return `${finding.track} in ${finding.clip}, ${sayWhen(finding, form, fps)}`;
}

/** `0.633 s`; a finding of no key is of the whole track. */
export function sayWhen(
  { keys, time }: Pick<ReportedFinding, 'keys' | 'time'>,
  form?: TimeForm,
  fps?: number,
): string {
  return keys.length === 0 ? 'all along' : sayTime(time, form, fps);
}

/** What is wrong, without a full stop: `key 19 stands 12.4° off its neighbours for one frame (limit 1.0°)`. */
export function sayFault({ message, count, effect }: ReportedFinding): string {
  const seen = effect === undefined ? '' : `, seen as ${sayEffect(effect)}`;
  return `${message.replace(/\.$/, '')}${seen}${count > 1 ? ` (the worst of ${count} places)` : ''}`;
}

/** `18 mm at the farthest joint`, `9 px in a picture of 1,080 rows`. */
function sayEffect({ value, unit }: NonNullable<ReportedFinding['effect']>): string {
  const size = value >= 10 ? value.toFixed(0) : String(Number(value.toPrecision(2)));
  return `${size} ${unit} ${unit === 'px' ? 'in a picture of 1,080 rows' : 'at the farthest joint'}`;
}

/** What to try, without a full stop: `lift out key 19`; nothing where no verb helps. */
export function sayRemedy({ remedy }: ReportedFinding): string {
  if (remedy === undefined) return '';
  const said = sayStep(remedy).replace(/\.$/, '');
  return said.charAt(0).toLowerCase() + said.slice(1);
}
