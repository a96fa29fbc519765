import { AS_WRITTEN } from './as-written.js';
import { CHORD } from './chord.js';
import { EULER_LINEAR } from './euler-linear.js';
import { FINITE_CUBIC } from './finite-cubic.js';
import { LONG_WAY } from './long-way.js';
import type { Playback, PlaybackId } from './playback.js';
import { RAW_CHORD } from './raw-chord.js';
import { SHORT_WAY } from './short-way.js';
import { STEP } from './step.js';
import { STORED_CUBIC } from './stored-cubic.js';

/** Every playback by its id, the default first. */
export const PLAYBACKS: Readonly<Record<PlaybackId, Playback>> = Object.freeze({
  'as-written': AS_WRITTEN,
  'short-way': SHORT_WAY,
  'long-way': LONG_WAY,
  chord: CHORD,
  'raw-chord': RAW_CHORD,
  'stored-cubic': STORED_CUBIC,
  'finite-cubic': FINITE_CUBIC,
  'euler-linear': EULER_LINEAR,
  step: STEP,
});
