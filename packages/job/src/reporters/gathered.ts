import { RULES, type Level } from '@slewcurve/survey';
import type { ReportedFinding } from '../report.js';
import { counted } from './say-verdict.js';

/** Findings of one rule and level in one file. */
export interface Gathered {
  readonly rule: string;
  readonly level: Level;
  readonly findings: readonly [ReportedFinding, ...ReportedFinding[]];
}

/** The findings by rule and level, in the order in which the first of each stands. */
export function gatherByRule(findings: readonly ReportedFinding[]): Gathered[] {
  const groups = new Map<string, [ReportedFinding, ...ReportedFinding[]]>();
  for (const finding of findings) {
    const key = `${finding.level} ${finding.rule}`;
    const group = groups.get(key);
    if (group) group.push(finding);
    else groups.set(key, [finding]);
  }
  return [...groups.values()].map((group) => ({
    rule: group[0].rule,
    level: group[0].level,
    findings: group,
  }));
}

/** `38 notes at 103 places: two neighbouring keys are stored on opposite sides. The first: Hips in Walk, 0.400 s.` */
export function sayGathered(findings: Gathered['findings'], first: string): string {
  const [{ rule, level }] = findings;
  const places = findings.reduce((sum, { count }) => sum + count, 0);
  const at = places > findings.length ? ` at ${counted(places, 'place')}` : '';
  const summary = RULES.find(({ id }) => id === rule)?.summary ?? '';
  return `${counted(findings.length, level)}${at}: ${summary} The first: ${first}.`;
}
