import { type RotationTrack, SlewcurveError, medianGap, regime } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import { checkTurning } from '../key-turns.js';
import { humOf } from '../smoothing/hum-of.js';
import { sharesOf } from '../smoothing/shares.js';
import type { Step } from '../step.js';
import { turnAlong } from '../turn-along.js';
import type { EditResult, Verb } from '../verb.js';

/** Least keys in a cycle: at two the keys no longer tell a hum from its mirror image. */
const KEYS_A_CYCLE = 2.2;

/** Least cycles in a span: fewer are a motion. */
const CYCLES = 4;

/** Cycles over which the edit fades where a hum runs on beyond what may change. */
const SHOULDER_CYCLES = 2;

/**
 * Takes a hum of one frequency out of a dense track: a narrow notch on log(carrier⁻¹q), the carrier a local average that no longer hums; see `humOf`. What
 * swings at `hertz` goes, as far as its strength and phase change no faster than the span tells from noise; all else stays. Where in the span the hum
 * begins and ends is found from the keys, so that nothing is put in where there is none.
 *
 * Where the hum runs on beyond the span, or over a kept key, the edit fades there over `shoulders` (two cycles unless told). Tangents of a
 * CUBICSPLINE are turned along, with the hum's own rate taken off.
 */
export const takeOutHum: Verb = Object.freeze({
  name: 'take out hum',
  summary: 'Takes one regular ripple out of a motion and leaves everything else.',
  alsoCalled: [
    'hum',
    'wobble',
    'vibration',
    'resonance',
    'notch',
    'notch filter',
    'band-stop',
    'ripple',
    'oscillation',
  ],
  opening: 'Take the hum out of',
  reads: ['hertz'] as const,
  needsAllowing: false,
  keysApart: false,
  insertsKeys: false,
  say: (step: Step) => sentenceOf('Take the hum out of', step),
  apply(track: RotationTrack, step: Step): EditResult {
    checkTurning(track, 'take a hum from');
    const { times } = track;
    const last = times.length - 1;
    const hertz = checkedHertz(track, step);
    const [begin, end] = step.span ?? [times[0] ?? 0, times[last] ?? 0];
    const from = times.findIndex((time) => time >= begin);
    let to = last;
    while (to >= 0 && times[to] > end) to--;
    if (from < 0 || !((times[to] - times[from]) * hertz >= CYCLES))
      throw new SlewcurveError(
        'step.too-short',
        `From ${begin} s to ${end} s there is no room for ${CYCLES} cycles at ${hertz} Hz. Widen the span to ${CYCLES / hertz} s or more.`,
        placeOf(track, Math.max(0, from)),
      );
    const hum = humOf(track, from, to, hertz);
    if (!hum)
      throw new SlewcurveError(
        'step.no-hum',
        `From ${begin} s to ${end} s nothing swings near ${hertz} Hz beyond noise. Give the frequency and the span of a hum that check names.`,
        placeOf(track, from),
      );
    const none = new Uint8Array(times.length);
    const shares = sharesOf(track, beyond(track, step, hum), none, step.shoulders ?? SHOULDER_CYCLES / hertz);
    const weighted = (vectors: Float64Array): Float64Array =>
      vectors.map((part, i) => part * shares[Math.floor(i / 3)]);
    return editResult(track, turnAlong(track, weighted(hum.turns), { slopes: weighted(hum.slopes) }));
  },
});

/** @throws SlewcurveError `step.needs-hertz`, `step.needs-dense-keys`, `step.too-fast` */
function checkedHertz(track: RotationTrack, { hertz }: Step): number {
  if (hertz === undefined)
    throw new SlewcurveError(
      'step.needs-hertz',
      'This edit needs to be told the frequency: hertz. Check names it with the finding.',
      placeOf(track),
    );
  const rate = 1 / medianGap(track);
  if (regime(track) === 'sparse')
    throw new SlewcurveError(
      'step.needs-dense-keys',
      `The keys of this track lie ${(1 / rate).toPrecision(3)} s apart: each is a decision, and no hum can be told from them.`,
      placeOf(track),
    );
  if (hertz * KEYS_A_CYCLE <= rate) return hertz;
  throw new SlewcurveError(
    'step.too-fast',
    `At ${rate.toPrecision(3)} keys a second a hum can be told up to ${(rate / KEYS_A_CYCLE).toPrecision(3)} Hz, not at ${hertz} Hz.`,
    placeOf(track),
  );
}

/** The step without the borders of its span between which the hum lies whole: those need no fading. */
function beyond(
  { times }: RotationTrack,
  step: Step,
  { from, to, cycle }: { readonly from: number; readonly to: number; readonly cycle: number },
): Step {
  const { span } = step;
  if (!span) return step;
  const startsInside = times[from] - span[0] > cycle / 2;
  const endsInside = span[1] - times[to] > cycle / 2;
  return { ...step, span: [startsInside ? -Infinity : span[0], endsInside ? Infinity : span[1]] };
}
