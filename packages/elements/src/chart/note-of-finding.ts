import { sayStep, type Step } from '@slewcurve/mend';
import type { Finding } from '@slewcurve/survey';
import type { MarginNote } from './chart-data.js';

/** A finding of the survey as the margin shows it; its remedy in words, and on a button. */
export function noteOfFinding(finding: Finding, status: MarginNote['status'] = 'open'): MarginNote {
  const { remedy } = finding;
  return {
    id: finding.fingerprint,
    rule: finding.rule,
    level: finding.level,
    message: finding.message,
    time: finding.time,
    places: finding.occurrences.map(({ time, span, level }) => ({ time, span, level })),
    count: finding.count,
    status,
    ...(remedy && { remedy: { sentence: sayStep(remedy), button: remedyButton(remedy) } }),
  };
}

/** Keys that a button can name before it counts them. */
const NAMED_KEYS = 3;

/** What the button says: the sentence up to the keys it acts on, "Lift out key 19"; many keys are counted. */
export function remedyButton(step: Step): string {
  const sentence = sayStep(step);
  // Openings may hold an "of" themselves: "Choose the side of key 3 of Hips in Walk".
  const opening = /^.*?\b(?:all keys|keys? \d[\d, and]*?)(?= of )/.exec(sentence)?.[0] ?? sentence;
  const count = step.keys?.length ?? 0;
  return count > NAMED_KEYS ? opening.replace(/keys\b.*$/, `${count.toLocaleString('en')} keys`) : opening;
}
