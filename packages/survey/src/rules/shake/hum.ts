import { angleFloor } from '@slewcurve/core';
import type { Limits, Place, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { addressOf } from '../jump/try-remedy.js';
import { toMillisecond } from '../to-millisecond.js';
import { ripplesOf, type Ripple } from './ripples.js';

const DEGREES = 180 / Math.PI;
const MACHINE = Object.freeze({ amplitude: 0.05, hertz: 4, share: 0.6 });
const BODY = Object.freeze({ amplitude: 0.3, hertz: 4, share: 0.6 });

/** A regular ripple on top of a motion. */
export const hum: Rule = Object.freeze({
  id: 'shake.hum',
  family: 'shake',
  level: 'warning',
  unit: 'Hz',
  alsoCalled: ['wobble', 'vibration', 'resonance', 'oscillation', 'ripple', 'gear mesh', 'shiver'],
  summary: 'For some seconds most of the motion is one regular ripple.',
  limits: Object.freeze({
    joint: BODY,
    prop: BODY,
    'camera-screen': MACHINE,
    'camera-headset': MACHINE,
    eye: 'off',
    machine: MACHINE,
  }),
  reads: 'track',
  untouched: 'everything outside the span; inside it all but the ripple, to 0.02°',
  find(context: TrackContext, limits: Limits): readonly Place[] {
    if (context.regime !== 'dense' || context.played.every(({ holds }) => holds)) return [];
    const { amplitude: limit = 0, hertz = 0, share = 0 } = limits;
    const { storage, interpolation } = context.track;
    const amplitude = Math.max(limit, 2 * angleFloor(storage, interpolation) * DEGREES);
    return runsOf(ripplesOf(context, { hertz, share, amplitude })).map((run) =>
      placeOf(context, run, hertz, amplitude),
    );
  },
  remedy(context: TrackContext, { span, value }: Place): Remedy | undefined {
    // The edit looks for the very frequency beside the one it is told.
    const hertz = Number(value.toPrecision(4));
    return { step: { verb: 'take out hum', ...addressOf(context), hertz, span: toMillisecond(span) } };
  },
  message({ value, span, facts }: Place): string {
    const { share = 0, amplitude = 0, least = 0 } = facts ?? {};
    return `from ${span[0].toFixed(2)} s to ${span[1].toFixed(2)} s it hums at ${value.toFixed(1)} Hz by ±${sayDegrees(amplitude)} (limit ${sayDegrees(least)}): ${(100 * share).toFixed(0)} % of its motion is that`;
  },
  page: {
    what: 'A mount that resonates, gears that mesh, a control loop or a filter that rings.',
    trace: 'A regular ripple over a stretch of seconds.',
    standard: 'glTF 2.0 says nothing about it.',
    programs: 'All play it.',
    people:
      'A shiver of the picture or of a limb. On a motorised head it feeds the resonance that it came from.',
    test: 'In a dense track, in windows of 2.5 s a quarter of a second apart: at least 60 % of the power of the angular rate, its mean taken off, within 1 Hz of the strongest line above 4 Hz, and that line’s swing over 0.3° for joints and props, 0.05° for cameras and machines, and over twice the noise floor. Windows side by side are one place, its keys the middles of the first and the last.',
    source: 'Common practice, no source. Gait has its harmonics below 4 Hz.',
    spares: 'Flutter and engines that are meant: declare them by an exception. Sparse and STEP tracks, eyes.',
    remedy: '`take out hum` cuts a narrow band out of the offset from a smooth carrier.',
  },
});

/** Windows in a row. */
function runsOf(ripples: readonly Ripple[]): Ripple[][] {
  const runs: Ripple[][] = [];
  for (const ripple of ripples) {
    const run = runs.at(-1);
    const last = run?.at(-1);
    // Windows that overlap hear the same hum.
    if (run && last && ripple.from - last.from <= 2 * (last.middle - last.from)) run.push(ripple);
    else runs.push([ripple]);
  }
  return runs;
}

function placeOf({ track }: TrackContext, run: readonly Ripple[], hertz: number, amplitude: number): Place {
  const purest = run.reduce((a, b) => (b.share > a.share ? b : a));
  const [first, last] = [run[0] ?? purest, run.at(-1) ?? purest];
  const { times } = track;
  return {
    keys: [...new Set([first.middle, last.middle])],
    time: times[purest.middle] ?? 0,
    span: [times[first.from] ?? 0, times[2 * last.middle - last.from] ?? times.at(-1) ?? 0],
    value: purest.hertz,
    limit: hertz,
    level: 'warning',
    confidence: purest.share,
    facts: { share: purest.share, amplitude: purest.amplitude, least: amplitude },
  };
}
