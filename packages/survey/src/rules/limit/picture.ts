import { sweepRate } from '@slewcurve/core';
import type { Limits, Place, PlayedTrack, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayRate } from '../../say-number.js';
import { DEGREES } from './over-limit.js';

/** At this many pictures a second and more, twice and a half as fast is let pass; up to 30, the limit as it is; between them evenly. */
const FAST_PICTURES = 60;
const SLOW_PICTURES = 30;
const FAST_FACTOR = 2.5;

/** Places in each piece of the curve that are looked at. */
const PLACES = 8;

const CAMERA = Object.freeze({ widths: 1 / 7, seconds: 1, whipWidths: 1, whipSeconds: 0.8 });

/** A camera that sweeps its picture too fast for its frame rate. */
export const pictureLimit: Rule = Object.freeze({
  id: 'limit.picture',
  family: 'limit',
  level: 'warning',
  unit: 'deg/s',
  alsoCalled: ['panning speed', 'judder', 'strobing', 'pan too fast', '7 second rule', 'shutter'],
  summary: 'A camera pans so fast that the picture judders at its frame rate.',
  limits: Object.freeze({
    joint: 'off',
    prop: 'off',
    'camera-screen': CAMERA,
    'camera-headset': 'off',
    eye: 'off',
    machine: 'off',
  }),
  reads: 'track',
  untouched: 'the path of orientations; its time grows',
  excusedBy: ['whips'] as const,
  find(
    context: TrackContext,
    { widths = 1 / 7, seconds = 1, whipWidths = 1, whipSeconds = 0.8 }: Limits,
  ): readonly Place[] {
    const { view, clip, played } = context;
    const first = played.find(({ holds }) => !holds);
    if (view === undefined || first === undefined) return [];
    const width = 2 * Math.tan(view / 2) * DEGREES;
    const limit = widths * width * factorAt(clip.frameRate ?? SLOW_PICTURES);
    return sweeps(first, limit, whipWidths * width).flatMap(({ from, to, most, at, whip }): Place[] => {
      // A whip inside it, short enough, is meant: nobody is to see that picture.
      const counted = to - from - (whip < whipSeconds ? whip : 0);
      if (!(counted > seconds)) return [];
      const key = context.track.times.findIndex((time) => time > from);
      const facts = { over: to - from, at };
      return [
        {
          keys: [key < 0 ? context.track.times.length - 1 : key],
          time: from,
          span: [from, to],
          value: most,
          limit,
          level: 'warning',
          playback: first.playback.id,
          facts,
        },
      ];
    });
  },
  remedy({ stored, track }: TrackContext, { limit, span }: Place): Remedy | undefined {
    if (stored !== track || track.interpolation === 'EULER') return undefined;
    // In its own span alone: what is fast beside it is another's work, a cut stored as motion above all.
    const inside = track.times.filter((time) => time >= span[0] - 1e-9 && time <= span[1] + 1e-9);
    if (inside.length < 2) return undefined;
    const [from = 0, to = 0] = [inside[0], inside.at(-1)];
    return {
      step: {
        verb: 'cap',
        clip: track.clip,
        track: track.id,
        rate: Math.floor(limit * 100) / 100,
        span: [from, to],
      },
    };
  },
  message({ value, limit, span, facts }: Place): string {
    return `for ${(facts?.['over'] ?? span[1] - span[0]).toFixed(2)} s it sweeps its picture at up to ${sayRate(value)}, and a width of the picture in 7 s, ${sayRate(limit)} here, is the limit`;
  },
  page: {
    what: 'A pan or a tilt that takes less time across the picture than the eye needs at its frame rate: things in it are seen twice, or jump from picture to picture.',
    trace: 'A plateau above the ruled line for more than a second.',
    standard: 'glTF 2.0 gives a camera’s view angle; no format gives a limit.',
    programs: 'All play it.',
    people: 'A picture that stutters. Blur hides it, and nobody looks at a whip.',
    test: 'Cameras on a screen that have a view angle: for more than 1 s together the middle of the picture moves faster than its width in 7 s, ω = 2·tan(view/2)/7, roll left out. Files at 60 pictures a second and more: 2.5 times that; between 30 and 60 evenly; without a frame rate as at 30. What moves faster than a width a second for less than 0.8 s is a whip, and its time does not count.',
    source:
      'One width in 7 s is the film maker’s rule of thumb for 24 pictures a second; the factor for 60 is common practice, no source.',
    spares:
      'Whips, declared or by their speed; cameras without a view angle; headsets, where the head decides.',
    remedy: '`cap` at that speed, in that span; the path stays and its time grows. Or declare the whip.',
  },
});

function factorAt(frameRate: number): number {
  const share = (frameRate - SLOW_PICTURES) / (FAST_PICTURES - SLOW_PICTURES);
  return 1 + (FAST_FACTOR - 1) * Math.max(0, Math.min(1, share));
}

interface Sweep {
  readonly from: number;
  to: number;
  most: number;
  at: number;
  /** Seconds of it that are a whip's. */
  whip: number;
}

/** Spans in which the picture is swept faster than `limit`, deg/s. */
function sweeps({ curve }: PlayedTrack, limit: number, whip: number): Sweep[] {
  const { knots } = curve;
  const now = new Float64Array(3);
  const found: Sweep[] = [];
  let open: Sweep | undefined;
  for (let i = 0; i + 1 < knots.length; i++) {
    const from = knots[i] ?? 0;
    const part = ((knots[i + 1] ?? 0) - from) / PLACES;
    for (let place = 0; place < PLACES; place++) {
      const time = from + (place + 0.5) * part;
      const speed = sweepRate(curve.rate(now, time, 'own')) * DEGREES;
      if (!(speed > limit)) {
        open = undefined;
        continue;
      }
      if (!open) found.push((open = { from: from + place * part, to: 0, most: 0, at: time, whip: 0 }));
      open.to = from + (place + 1) * part;
      if (speed > open.most) [open.most, open.at] = [speed, time];
      if (speed > whip) open.whip += part;
    }
  }
  return found;
}
