import { type RotationTrack, SlewcurveError, letAngleGo, pace, playAs } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { DEGREES } from '../edit-result.js';
import { paceSpan } from '../pace/pace-span.js';
import { storeFreed } from '../pace/store-freed.js';
import { storePaced } from '../pace/store-paced.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';

/**
 * Presses the speed up or down at one time, with soft shoulders. With the same ends the angle is borrowed from the rest of the span, v* = v + b − k·w, so the
 * area stays; letting time run, the span gets shorter or longer; letting angle go, every time stays, the turn goes on further, or less far, about the axis
 * that it has, and all that follows is turned by what that comes to (q* = d·q, parent axes).
 */
export const shape: Verb = Object.freeze({
  name: 'shape',
  summary: 'Presses the speed up or down at a place; the path stays, unless the angle is let go.',
  alsoCalled: ['speed ramp', 'time remap', 'bulge', 'speed curve', 'accent'],
  opening: 'Shape the speed of',
  reads: ['at', 'by', 'reach', 'ends', 'with', 'store'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Shape the speed of', step),
  apply(track: RotationTrack, step: Step): EditResult {
    const span = paceSpan(track, step);
    const { at, by, reach, ends = 'same', shoulders } = step;
    if (at === undefined || by === undefined || reach === undefined)
      throw new SlewcurveError(
        'step.needs-press',
        'Say where, by how much and how far: at in seconds, by in deg/s, reach in seconds.',
        placeOf(track),
      );
    const path = playAs(track, 'as-written');
    if (ends === 'go')
      return storeFreed(track, letAngleGo(path, { at, by: by / DEGREES, reach, span }), step);
    const press = { at, by: by / DEGREES, reach, ends, ...(shoulders !== undefined && { shoulders }) };
    const paced = pace(path, { kind: 'press', ...press, span });
    return storePaced(track, span, paced, step, 'smooth');
  },
});
