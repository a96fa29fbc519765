import { medianGap, segmentAngle } from '@slewcurve/core';
import type { Limits, Place, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayDegrees, saySeconds } from '../../say-number.js';

const DEGREES = 180 / Math.PI;

/** Samples that a capture lost. */
export const hole: Rule = Object.freeze({
  id: 'file.hole',
  family: 'file',
  level: 'warning',
  unit: 's',
  alsoCalled: [
    'lost samples',
    'dropouts',
    'missing samples',
    'gap',
    'lost tracking',
    'frame gap',
    'occlusion',
  ],
  summary: 'Samples are missing: nothing is known of the motion for a while.',
  limits: Object.freeze({
    joint: { gaps: 1.5, turn: 2 },
    prop: { gaps: 1.5, turn: 2 },
    'camera-screen': { gaps: 1.5, turn: 0.5 },
    'camera-headset': { gaps: 1.5, turn: 0.5 },
    eye: { gaps: 1.5, turn: 2 },
    machine: { gaps: 1.5, turn: 0.5 },
  }),
  reads: 'track',
  untouched: 'every key',
  find({ track }: TrackContext, { gaps = 0, turn: most = 0 }: Limits): readonly Place[] {
    const { times } = track;
    const usual = medianGap(track);
    return track.breaks
      .filter((key) => (times[key + 1] ?? 0) - (times[key] ?? 0) > gaps * usual)
      .map((key) => {
        const span = [times[key] ?? 0, times[key + 1] ?? 0] as const;
        const value = span[1] - span[0];
        const turn = segmentAngle(track, key) * DEGREES;
        const facts = { turn, lost: Math.max(1, Math.round(value / usual) - 1) };
        const level = turn > most ? 'warning' : 'note';
        return { keys: [key + 1], time: span[0], span, value, limit: gaps * usual, level, facts };
      });
  },
  remedy: (): Remedy | undefined => undefined,
  message({ keys: [key = 0], value, limit, facts }: Place): string {
    const { lost = 0, turn = 0 } = facts ?? {};
    return `for ${saySeconds(value)} before key ${key} some ${lost} ${lost === 1 ? 'sample is' : 'samples are'} missing (limit ${saySeconds(limit)}); across them it turns by ${sayDegrees(turn)}, and how is not known`;
  },
  page: {
    what: 'A tracker that lost sight of its markers, a stream that broke off: rows without numbers, or a step in time over several samples, in text that is read as a capture.',
    trace: 'A gap. Nothing is played in it but the last pose.',
    standard:
      'glTF 2.0 has no holes: a track goes on from key to key. Text of a capture leaves rows out, or fills them with NaN.',
    programs: 'Some hold the last pose, some draw a straight line across, some fail on the empty row.',
    people: 'A freeze and a leap, or a slide. A motorised head must not be driven across it unseen.',
    test: 'A break that the reader found (rows without an orientation, or a step in time beyond 2.5 usual ones), longer than one and a half usual key gaps. A warning where the orientation turns across it by more than 2° (cameras and machines 0.5°), a note elsewhere. Nothing else is claimed across a hole.',
    source: 'Common practice, no source.',
    spares: 'Declared cuts, which last no longer than a usual gap; formats that have no holes.',
    remedy: 'Get the lost samples from the source, or lay keys across by hand. No verb does it.',
  },
});
