import type { Limits, Place, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayDegrees, saySeconds } from '../../say-number.js';
import { segmentsOf, type Segments } from '../../segments.js';

/** Frames that a cut may take when it is stored as motion, and the rate of a clip that lies on no grid. */
const FRAMES = 2;
const USUAL_RATE = 30;

const CAMERA = Object.freeze({ size: 20, calm: 0.25 });

/** A cut that is stored as two close keys, so that it is played as a turn. */
export const cutSmear: Rule = Object.freeze({
  id: 'jump.cut-smear',
  family: 'jump',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['pop', 'camera cut', 'smeared cut', 'interpolated cut', 'flash frame', 'swish between shots'],
  summary: 'A camera turns far within two frames, with calm on both sides: a cut that is played as motion.',
  limits: Object.freeze({
    joint: 'off',
    prop: 'off',
    'camera-screen': CAMERA,
    'camera-headset': CAMERA,
    eye: 'off',
    machine: 'off',
  }),
  reads: 'track',
  untouched: 'both keys',
  excusedBy: ['whips'] as const,
  find(context: TrackContext, { size = 0, calm = 0 }: Limits): readonly Place[] {
    if (context.played.every(({ holds }) => holds)) return [];
    const { times } = context.track;
    const segments = segmentsOf(context);
    // A hundredth of a frame for times that were rounded.
    const longest = (FRAMES * 1.01) / (context.clip.frameRate ?? USUAL_RATE);
    const places: Place[] = [];
    for (const [k, value] of segments.turns.entries()) {
      const span = [times[k] ?? 0, times[k + 1] ?? 0] as const;
      if (!(value > size && span[1] - span[0] <= longest && isCalmBeside(segments, k, calm))) continue;
      places.push({ keys: [k + 1], time: span[1], span, value, limit: size, level: 'warning' });
    }
    return places;
  },
  // `declare cut` is not built yet.
  remedy: (): Remedy | undefined => undefined,
  message({ keys: [key = 0], value, limit, span }: Place): string {
    return `from key ${key - 1} to key ${key} the camera turns ${sayDegrees(value)} in ${saySeconds(span[1] - span[0])} (limit ${sayDegrees(limit)}), with calm on both sides: if a cut is meant, declare it`;
  },
  page: {
    what: 'A cut between two shots, stored as two keys a frame or two apart under LINEAR or CUBICSPLINE. Players fill the gap with a turn.',
    trace: 'One enormous block, at most two frames wide.',
    standard:
      'glTF 2.0 has STEP for a whole sampler only; a cut inside a LINEAR one has to be two keys close together, or two clips.',
    programs: 'All play the turn between. How many frames of it are seen depends on their frame rate.',
    people:
      'A flash of smeared picture: none or one frame of it at the source’s own rate, three or four at 120 frames a second. In a headset it is a blow to the eye.',
    test: 'Cameras only: more than 20° within two frames (of the clip’s grid; of 30 a second without one), and slower than a quarter of that speed on both sides.',
    source: 'Common practice, no source.',
    spares: 'Whip pans, which take four frames or more; declared cuts and whips; STEP tracks.',
    remedy:
      'Declare the cut in the house rules, or split the clip there. The verb `declare` is not built yet; nothing has to be moved.',
  },
});

/** Whether both neighbours of a segment, where there are any, turn slower than a share of its speed. */
function isCalmBeside({ speeds }: Segments, segment: number, share: number): boolean {
  const most = share * (speeds[segment] ?? 0);
  return [speeds[segment - 1], speeds[segment + 1]].every((speed) => !((speed ?? 0) >= most));
}
