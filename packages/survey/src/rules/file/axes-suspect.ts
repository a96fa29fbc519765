import { angleBetween, conjugate, keyOrientation, multiply, rotateVector } from '@slewcurve/core';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { isFirstOfClip } from './whole-clip.js';

const DEGREES = 180 / Math.PI;
/** Degrees within which the joints below stand at their rest. */
const AT_REST = 45;
/** Share of them that must. */
const MOST = 0.6;

/** A figure that lies on its side because an axis was misread. */
export const axesSuspect: Rule = Object.freeze({
  id: 'file.axes-suspect',
  family: 'file',
  level: 'note',
  unit: 'deg',
  alsoCalled: ['up axis', 'Z up', 'Y up', 'handedness', 'lying on its side', 'wrong axes', 'axis conversion'],
  summary:
    'A whole figure begins turned over by 90°, 120° or 180° from its rest, as if its axes had been misread.',
  limits: everyRole({ near: 5, tracks: 10 }),
  reads: 'track',
  untouched: 'how all parts turn against each other',
  find(context: TrackContext, { near = 0, tracks: fewest = 0 }: Limits): readonly Place[] {
    const { clip, nodes } = context;
    if (!isFirstOfClip(context)) return [];
    const turns = clip.tracks.flatMap((track) => {
      const rest = nodes[track.source.node]?.rotation;
      if (rest === undefined || track.times.length === 0) return [];
      const pose = keyOrientation(new Float64Array(4), track, 0);
      return [multiply(pose, pose, conjugate(new Float64Array(4), rest))];
    });
    const [root, ...below] = turns;
    if (root === undefined || turns.length < fewest) return [];
    const still = below.filter((turn) => angleOf(turn) < AT_REST).length;
    const change = CHANGES.find((one) => angleBetween(one, root) * DEGREES < near);
    if (change === undefined || still < MOST * below.length) return [];
    const value = angleOf(root);
    const { start, end } = clip;
    return [{ keys: [0], time: start, span: [start, end], value, limit: near, level: 'note' }];
  },
  // Which of two axes was misread, and whether at all, only a person can say.
  remedy: (): Remedy | undefined => undefined,
  message({ value, limit }: Place): string {
    return `the whole figure begins ${sayDegrees(value)} from its rest, within ${sayDegrees(limit)} of an exchange of axes, while its parts stand near theirs: if it should stand upright, its axes were misread`;
  },
  page: {
    what: 'One program’s up is another’s forward. A root that was converted twice, or not at all, lies on its side; the parts below it are right.',
    trace: 'Nothing: speeds are the same in any axes.',
    standard: 'glTF 2.0 is right-handed with +Y up and forward +Z. BVH and delimited text do not say.',
    programs: 'All play what is stored.',
    people: 'A figure that lies on its back, swims through the floor or walks up a wall.',
    test: 'Of a clip with ten tracks or more whose nodes have a rest: the first track’s first pose is within 5° of a turn that exchanges axes (90°, 120° or 180°) and moves the up axis, from its rest, while 60 % of all others begin within 45° of theirs. Always a note, told once a clip.',
    source:
      'There are 23 turns that exchange axes, 20 of which move the up axis (geometry). The limits are common practice, no source.',
    spares:
      'Turns about the up axis: a figure may face any way. Figures that truly lie or hang cannot be told apart, hence the note.',
    remedy: '`restate` with the axes named, for the whole file; relative speeds stay to the bit.',
  },
});

function angleOf(turn: Float64Array): number {
  return angleBetween(turn, Float64Array.of(0, 0, 0, 1)) * DEGREES;
}

/** The turns that exchange axes and move +Y elsewhere. */
const CHANGES: readonly Float64Array[] = quarterTurns().filter((turn) => {
  const up = rotateVector(new Float64Array(3), turn, [0, 1, 0]);
  return (up[1] ?? 0) < 0.5;
});

/** The 24 turns of a cube: products of quarter turns about x, y and z, each once. */
function quarterTurns(): Float64Array[] {
  const half = Math.SQRT1_2;
  const about = [0, 1, 2].map((axis) =>
    Float64Array.from([0, 1, 2, 3], (_, i) => (i === axis || i === 3 ? half : 0)),
  );
  const found = [Float64Array.of(0, 0, 0, 1)];
  for (const turn of found)
    for (const quarter of about) {
      const next = multiply(new Float64Array(4), turn, quarter);
      if (found.every((other) => angleBetween(other, next) > 0.1)) found.push(next);
    }
  return found;
}
