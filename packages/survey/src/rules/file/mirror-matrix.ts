import { nodeChain, type Clip, type SceneNode } from '@slewcurve/core';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { isTime } from './is-time.js';

const DEGREES = 180 / Math.PI;

/** A matrix that is no turn and no scale. */
export const mirrorMatrix: Rule = Object.freeze({
  id: 'file.mirror-matrix',
  family: 'file',
  level: 'warning',
  unit: 'numbers',
  alsoCalled: [
    'negative determinant',
    'reflection',
    'negative scale',
    'mirrored',
    'shear',
    'skew',
    'inside out',
    'non-orthogonal matrix',
  ],
  summary: 'A matrix reflects or shears, so that no quaternion can say what it does.',
  limits: everyRole({ shear: 1e-3 }),
  reads: 'stored',
  untouched: 'everything',
  find(context: TrackContext, limits: Limits): readonly Place[] {
    return [...amongKeys(context, limits), ...amongNodes(context, limits)];
  },
  // A reflection is taken off as a scale when the file is read; a shear has to go at its source.
  remedy: (): Remedy | undefined => undefined,
  message({ keys, value, other, facts = {} }: Place): string {
    const reflected = facts['reflected'] ?? 0;
    const off = `up to ${sayDegrees(facts['offSquare'] ?? 0)} off square`;
    if (other !== undefined) {
      const where = facts['above'] === 0 ? 'the matrix of its node' : `the matrix of ${other} above it`;
      return `${where} ${reflected > 0 ? 'is reflected: it turns a right hand into a left' : `is sheared: its columns are ${off}`}`;
    }
    const from = `from key ${keys[0]} on`;
    const sheared = value - reflected;
    const kinds = [
      ...(reflected > 0 ? [`${reflected} reflected`] : []),
      ...(sheared > 0 ? [`${sheared} sheared, ${off}`] : []),
    ];
    const changes = facts['changes'] === 1 ? '; the reflection comes and goes, so no scale can hold it' : '';
    return `of ${facts['all']} matrices ${kinds.join(' and ')}, ${from}; the nearest turn is read${changes}`;
  },
  page: {
    what: 'A mirrored half of a figure, a negative or uneven scale above a turned part, or a matrix put together by hand. Nothing but a turn fits into a quaternion: what is left over makes conversions guess.',
    trace:
      'As Slewcurve reads it, nothing: a reflection is split off as one negative scale, a shear left out. Converted without that care, half turns at random keys.',
    standard:
      'glTF 2.0 (“Transformations”) wants a node’s matrix to be a translation, a rotation and a scale, which no sheared one is, and allows none on an animated node. A negative determinant is allowed: it means that triangles face the other way.',
    programs:
      'Formulas that read a quaternion off a matrix’s diagonal give any turn at all for a reflected one.',
    people: 'Parts that are inside out, or snap round by half a turn.',
    test: 'Where the file gives matrices: a negative determinant, or two columns whose cosine is above 1e-3 (0.057° off square). Of a table, all matrices of a track; of a node tree, those of the track’s node and of what is above it, told once a clip. A warning; an error where reflected and other matrices take turns within one track.',
    source:
      'The limit is common practice, no source; a rotation that went through float32 stays below 4e-7 (arithmetic).',
    spares: 'Negative scales that the file states as scales: they are told apart from the turn already.',
    remedy:
      'None here: the reflection belongs into a scale that stays the same all along, the shear out of the source. Orientations are read as the nearest turn meanwhile.',
  },
});

function amongKeys({ stored }: TrackContext, { shear: most = 0 }: Limits): Place[] {
  const flaws = stored.source.matrices;
  // Keys that were added or dropped since have no matrix of their own any more.
  if (flaws === undefined || flaws.shear.length !== stored.times.length) return [];
  const keys: number[] = [];
  let reflected = 0;
  let worst = 0;
  flaws.shear.forEach((shear, key) => {
    worst = Math.max(worst, shear);
    reflected += flaws.reflected[key] ?? 0;
    if (flaws.reflected[key] === 1 || shear > most) keys.push(key);
  });
  if (keys.length === 0) return [];
  const all = stored.times.length;
  const changes = reflected > 0 && reflected < all;
  const timeOf = (key: number | undefined): number => {
    const time = stored.times[key ?? 0] ?? 0;
    return isTime(time) ? time : 0;
  };
  return [
    {
      keys: keys.slice(0, MOST_KEYS),
      time: timeOf(keys[0]),
      span: [timeOf(keys[0]), timeOf(keys.at(-1))],
      value: keys.length,
      limit: 0,
      level: changes ? 'error' : 'warning',
      facts: { all, reflected, offSquare: offSquare(worst), changes: changes ? 1 : 0 },
    },
  ];
}

/** Keys that a finding lists; all are counted. */
const MOST_KEYS = 100;

/** Matrices of the track's node and of those above it, each told on the first track of the clip that stands at or below it. */
function amongNodes({ stored, clip, nodes }: TrackContext, { shear: most = 0 }: Limits): Place[] {
  const places: Place[] = [];
  for (const node of nodeChain(nodes, stored.source.node)) {
    const matrix = nodes[node]?.matrix;
    if (matrix === undefined || (!matrix.reflected && !(matrix.shear > most))) continue;
    if (firstBelow(clip, nodes).get(node) !== stored.id) continue;
    places.push({
      keys: [],
      time: clip.start,
      span: [clip.start, clip.end],
      value: 1,
      limit: 0,
      level: 'warning',
      other: nodes[node]?.path ?? `#${node}`,
      facts: {
        above: node === stored.source.node ? 0 : 1,
        reflected: matrix.reflected ? 1 : 0,
        offSquare: offSquare(matrix.shear),
      },
    });
  }
  return places;
}

const known = new WeakMap<Clip, ReadonlyMap<number, string>>();

/** Of every node with a matrix, the first track of the clip at or below it. */
function firstBelow(clip: Clip, nodes: readonly SceneNode[]): ReadonlyMap<number, string> {
  const before = known.get(clip);
  if (before !== undefined) return before;
  const first = new Map<number, string>();
  for (const { id, source } of clip.tracks)
    for (const node of nodeChain(nodes, source.node))
      if (nodes[node]?.matrix !== undefined && !first.has(node)) first.set(node, id);
  known.set(clip, first);
  return first;
}

function offSquare(shear: number): number {
  return Math.asin(Math.min(1, shear)) * DEGREES;
}
