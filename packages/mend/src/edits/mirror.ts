import { type RotationTrack, SlewcurveError, angleBetween, replaceTrack } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { DEGREES, editResult } from '../edit-result.js';
import type { Step } from '../step.js';
import type { EditResult, EditScene, Verb } from '../verb.js';
import { anglesIn } from '../angles-in.js';
import { refuseParts } from '../whole-track.js';

/** Degrees by which a pair's rest poses may differ from mirror images: more is a skeleton whose sides have axes of their own kind. */
const LIKE = 5;

/**
 * The motion seen in a mirror that stands square to axis `normal` of the parent: the turn about that axis stays, those about the other two reverse, in
 * quaternions, tangents and angles alike, to the bit. With `pairs` the sides change places: `[["Left", "Right"]]` gives each track whose id has "Left" the
 * mirrored motion of the one with "Right". Mirrored twice it is what it was.
 */
export const mirror: Verb = Object.freeze({
  name: 'mirror',
  summary: 'Mirrors motion left to right; named sides change places.',
  alsoCalled: ['flip', 'left/right', 'swap sides', 'symmetry', 'reflect', 'opposite pose'],
  opening: 'Mirror',
  reads: ['normal', 'pairs'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: false,
  say: (step: Step) => sentenceOf('Mirror', step),
  apply(track: RotationTrack, step: Step, scene?: EditScene): EditResult {
    refuseParts(track, step, ['span', 'keep']);
    const { normal, pairs = [] } = step;
    if (normal === undefined)
      throw new SlewcurveError(
        'step.needs-normal',
        'Say across which axis it is mirrored: normal, x, y or z of the parent.',
        placeOf(track),
      );
    const partner = partnerOf(track, pairs, scene);
    if (partner !== track) checkAlike(track, partner, normal, scene);
    const after = mirrored(partner, normal);
    if (partner === track) return editResult(track, replaceTrack(track, { values: after }));
    const { times, breaks, interpolation, sequence } = partner;
    const taken = replaceTrack(track, {
      times,
      breaks,
      interpolation,
      values: after,
      ...(sequence !== undefined && { sequence }),
    });
    return takenOver(track, anglesIn(taken, track.sequence));
  },
});

/** The track whose motion it takes: itself where no name of a pair is in its id. */
function partnerOf(
  track: RotationTrack,
  pairs: readonly (readonly [string, string])[],
  scene: EditScene | undefined,
): RotationTrack {
  const swap = new Map(pairs.flatMap(([a, b]) => [[a, b] as const, [b, a] as const]));
  const id = otherSide(track.id, swap);
  if (id === track.id) return track;
  const partner = scene?.named.find((other) => other.id === id && other.clip === track.clip);
  if (partner) return partner;
  const isThere = scene?.tracks.some((other) => other.id === id && other.clip === track.clip) === true;
  throw new SlewcurveError(
    'step.no-partner',
    `Its other side would be ${id}, ${isThere ? 'which the step does not name; name both sides' : 'which has no track in this clip'}.`,
    placeOf(track),
  );
}

/** An id with every name of a pair in it swapped for the other, the longest first. */
function otherSide(id: string, swap: ReadonlyMap<string, string>): string {
  const names = [...swap.keys()].map((name) => name.replace(/[.*+?^${}()|[\]\\/]/g, String.raw`\$&`));
  if (names.length === 0) return id;
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  const longestFirst = names.sort((a, b) => b.length - a.length).join('|');
  return id.replace(new RegExp(longestFirst, 'g'), (name) => swap.get(name) ?? name);
}

/** @throws SlewcurveError `step.unlike-pair` where the rest poses of both sides are no mirror images */
function checkAlike(
  track: RotationTrack,
  partner: RotationTrack,
  normal: 'x' | 'y' | 'z',
  scene: EditScene | undefined,
): void {
  const restOf = ({ id }: RotationTrack): readonly number[] | undefined =>
    scene?.nodes.find(({ path }) => path === id)?.rotation;
  const [own, other] = [restOf(track), restOf(partner)];
  if (!own || !other) return;
  const apart = angleBetween(own, flipped(other, normal)) * DEGREES;
  if (apart <= LIKE) return;
  throw new SlewcurveError(
    'step.unlike-pair',
    `At rest it is ${apart.toFixed(1)}° from the mirror image of ${partner.id} (limit ${LIKE}°): the two sides have axes of another kind, or ${normal} is not the axis from left to right.`,
    placeOf(track),
  );
}

function mirrored(
  { interpolation, sequence = 'XYZ', values }: RotationTrack,
  normal: 'x' | 'y' | 'z',
): Float64Array {
  if (interpolation !== 'EULER') return flipped(values, normal);
  const small = sequence.toLowerCase();
  return values.map((angle, i) => (small[i % 3] === normal ? angle : -angle));
}

/** Quaternions, four numbers each, with the parts that are neither along the normal nor real negated. */
function flipped(values: ArrayLike<number>, normal: 'x' | 'y' | 'z'): Float64Array {
  const kept = 'xyz'.indexOf(normal);
  return Float64Array.from(values, (number, i) => (i % 4 === 3 || i % 4 === kept ? number : -number));
}

/** All keys are another track's. */
function takenOver(track: RotationTrack, after: RotationTrack): EditResult {
  if (
    track.times.length === after.times.length &&
    track.times.every((time, key) => time === after.times[key])
  )
    return editResult(track, after);
  const oldKeys = Array.from(after.times, (time) => track.times.indexOf(time));
  const ascending = oldKeys.every((old, i) => old < 0 || old > Math.max(-1, ...oldKeys.slice(0, i)));
  return editResult(track, after, { oldKeys: ascending ? oldKeys : oldKeys.map(() => -1) });
}
