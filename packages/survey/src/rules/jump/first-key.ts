import { medianGap } from '@slewcurve/core';
import { median } from '../../median.js';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { segmentsOf } from '../../segments.js';
import { addressOf } from './try-remedy.js';

/** Segments after the first that say what is usual. */
const USUAL = 7;

/** A reference pose left on the first frame. */
export const firstKey: Rule = Object.freeze({
  id: 'jump.first-key',
  family: 'jump',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['pop', 'rest pose', 'T-pose frame', 'bind pose', 'reference frame', 'first frame'],
  summary: 'The first key stands far from where the motion begins: a reference pose left on frame 0.',
  limits: everyRole({ size: 20, times: 10 }),
  reads: 'track',
  untouched: 'all keys from the second on',
  excusedBy: ['whips'] as const,
  find(context: TrackContext, { size = 0, times: usually = 0 }: Limits): readonly Place[] {
    const { times } = context.track;
    if (times.length < USUAL + 2 || context.played.every(({ holds }) => holds)) return [];
    const { turns } = segmentsOf(context);
    const value = turns[0] ?? 0;
    const usual = median(turns.subarray(1, 1 + USUAL));
    const span = [times[0] ?? 0, times[1] ?? 0] as const;
    const near = span[1] - span[0] <= 2 * medianGap(context.track);
    // A clip may start in a fast move: then the second step is fast as well.
    if ((turns[1] ?? 0) > value / 2) return [];
    if (!(near && value > size && value > usually * usual)) return [];
    const place = { keys: [0], time: span[0], span, value, limit: size, level: 'warning' as const };
    return [{ ...place, facts: { usual } }];
  },
  remedy(context: TrackContext, { keys }: Place): Remedy | undefined {
    const held = { verb: 'bridge', ...addressOf(context), keys };
    return { step: { verb: 'trim', ...addressOf(context), keys }, alternatives: [held] };
  },
  message({ value, limit, facts }: Place): string {
    return `key 0 stands ${sayDegrees(value)} from key 1 (limit ${sayDegrees(limit)}), where the next steps turn ${sayDegrees(facts?.['usual'] ?? 0)}: it looks like a reference pose`;
  },
  page: {
    what: 'Capture and rigging software keep the rest pose on the first frame, so that the next program finds it. Left in the clip it is played.',
    trace: 'One tall needle at the very start.',
    standard: 'glTF 2.0 says nothing about it: the file is valid, and a validator is silent.',
    programs: 'Every program plays it as it stands. CMU’s BVH conversions carry such a frame by design.',
    people: 'A flash of arms stretched out, once a loop. On motors it is a lunge from the rest pose.',
    test: 'The first step turns more than 20° and more than ten times the median of steps 2 to 8, and the second step is less than half as wide. The first gap must be no longer than two usual ones, and all eight steps must be there.',
    source: 'Common practice, no source.',
    spares:
      'Clips of fewer than nine keys, a first key set apart in time, STEP tracks, declared cuts and whips.',
    remedy:
      '`trim` drops the key; the others keep their times, and the pose of the new first key is held before it. Where all tracks share their rows (BVH, tables) no key can go: `bridge` gives it the pose of the next one. Either loses the reference pose, so that `--proposed` trims only if allowed.',
  },
});
