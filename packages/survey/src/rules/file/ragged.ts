import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { saySeconds } from '../../say-number.js';

/** The frame of a clip that lies on no grid, seconds. */
const USUAL_FRAME = 1 / 30;

/** A track that starts late or ends early. */
export const ragged: Rule = Object.freeze({
  id: 'file.ragged',
  family: 'file',
  level: 'note',
  unit: 's',
  alsoCalled: ['uneven ends', 'short track', 'late start', 'early end', 'different length', 'clip length'],
  summary: 'A track starts later or ends earlier than its clip.',
  limits: everyRole({ frames: 0.5 }),
  reads: 'track',
  untouched: 'every key',
  find({ track, clip }: TrackContext, { frames = 0 }: Limits): readonly Place[] {
    const { times } = track;
    if (times.length < 2) return [];
    const [first, last] = [times[0] ?? 0, times.at(-1) ?? 0];
    const limit = frames * (clip.frameRate === undefined ? USUAL_FRAME : 1 / clip.frameRate);
    const ends: readonly (readonly [number, number, number])[] = [
      [0, clip.start, first],
      [times.length - 1, last, clip.end],
    ];
    return ends
      .filter(([, from, to]) => to - from > limit && to - from < Infinity)
      .map(([key, from, to]) => ({
        keys: [key],
        time: key === 0 ? first : last,
        span: [from, to],
        value: to - from,
        limit,
        level: 'note',
      }));
  },
  remedy: (): Remedy | undefined => undefined,
  message({ keys: [key = 0], value, limit }: Place): string {
    const what = key === 0 ? 'starts' : 'ends';
    return `the track ${what} ${saySeconds(value)} ${key === 0 ? 'after its clip starts' : 'before its clip ends'}, at key ${key} (limit ${saySeconds(limit)}); its pose is held there`;
  },
  page: {
    what: 'Tracks of one clip that were keyed or trimmed one by one.',
    trace: 'A flat line at one end.',
    standard:
      'glTF 2.0 (“Animations”) holds the first value before the first key and the last one after the last.',
    programs:
      'Most hold the end pose; a loop’s length is the longest track’s, so that a short one waits for it.',
    people: 'Usually nothing; in a loop a limb that waits.',
    test: 'First or last key more than half a frame inside the clip’s own span, over all its rotation tracks. Always a note.',
    source: 'Common practice, no source.',
    spares: 'Tracks of one key. A late start may be meant.',
    remedy: 'Add a key that holds the pose at the clip’s end, or leave it.',
  },
});
