import { sayStep } from '@slewcurve/mend';
import type { ReportedFinding } from '../report.js';

/** Where and when: `Hips/Spine/Neck in Walk, 0.633 s`. */
export function sayPlace(finding: ReportedFinding): string {
  return `${finding.track} in ${finding.clip}, ${sayWhen(finding)}`;
}

/** `0.633 s`; a finding of no key is of the whole track. */
export function sayWhen({ keys, time }: Pick<ReportedFinding, 'keys' | 'time'>): string {
  return keys.length === 0 ? 'all along' : `${time.toFixed(3)} s`;
}

/** What is wrong, without a full stop: `key 19 stands 12.4° off its neighbours for one frame (limit 1.0°)`. */
export function sayFault({ message, count }: ReportedFinding): string {
  return `${message.replace(/\.$/, '')}${count > 1 ? ` (the worst of ${count} places)` : ''}`;
}

/** What to try, without a full stop: `lift out key 19`; nothing where no verb helps. */
export function sayRemedy({ remedy }: ReportedFinding): string {
  if (remedy === undefined) return '';
  const said = sayStep(remedy).replace(/\.$/, '');
  return said.charAt(0).toLowerCase() + said.slice(1);
}
