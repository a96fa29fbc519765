import { notFinite } from './rules/file/not-finite.js';
import { notNormalised } from './rules/file/not-normalised.js';
import { timeOrder } from './rules/file/time-order.js';
import { loneKey } from './rules/jump/lone-key.js';
import { shelf } from './rules/jump/shelf.js';
import { elbow } from './rules/pace/elbow.js';
import { half } from './rules/turn/half.js';
import { signFlip } from './rules/turn/sign-flip.js';
import type { Rule } from './rule.js';

/** Every rule that is built. */
export const RULES: readonly Rule[] = Object.freeze([
  notFinite,
  notNormalised,
  timeOrder,
  signFlip,
  half,
  loneKey,
  shelf,
  elbow,
]);
