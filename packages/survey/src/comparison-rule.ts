import type { Rule } from './rule.js';
import { drift } from './rules/keys/drift.js';
import { tooFew } from './rules/keys/too-few.js';

/** A fault that one file alone never shows: told by a comparison with its source, by limits that the asker names. */
export type ComparisonRule = Pick<
  Rule,
  'id' | 'family' | 'level' | 'alsoCalled' | 'summary' | 'untouched' | 'page'
>;

/** Every rule of comparisons; house rules know none of them. */
export const COMPARISON_RULES: readonly ComparisonRule[] = Object.freeze([tooFew, drift]);
