import { kestrelPointRules, type JobSettings } from '@slewcurve/job';
import { matchesPattern } from '@slewcurve/mend';
import type { HouseRules } from '@slewcurve/survey';
import type { FileWork } from './file-work.js';

/** What a file is surveyed by: the page's settings, the clips that are said to play as loops, and the demo scene's own house rules. */
export function settingsOf(
  file: Pick<FileWork, 'blob' | 'loops'> | undefined,
  settings: JobSettings,
): JobSettings {
  if (!file) return settings;
  const houseRules = withLoops(file.blob ? settings.houseRules : kestrelPointRules, file.loops);
  return houseRules === settings.houseRules ? settings : { ...settings, houseRules };
}

/** Whether a clip is declared to play as a loop. */
export function playsAsLoop({ loops }: HouseRules, clip: string): boolean {
  return loops.some((pattern) => matchesPattern(pattern, clip));
}

// The same rules are the same object, so that nothing is drawn anew.
const made = new WeakMap<readonly string[], { readonly of: HouseRules; readonly rules: HouseRules }>();

function withLoops(of: HouseRules, loops: readonly string[]): HouseRules {
  if (loops.length === 0) return of;
  const known = made.get(loops);
  if (known?.of === of) return known.rules;
  const rules = { ...of, loops: [...of.loops, ...loops] };
  made.set(loops, { of, rules });
  return rules;
}
