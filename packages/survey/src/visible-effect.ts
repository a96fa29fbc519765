import type { SceneNode } from '@slewcurve/core';
import { significant } from './significant.js';

/** What is seen of a fault: how far the tip moves, or the picture. */
export interface VisibleEffect {
  readonly value: number;
  /** Millimetres at the farthest descendant; pixels of a picture 1,080 high. */
  readonly unit: 'mm' | 'px';
}

const RADIANS = Math.PI / 180;
/** Rows of the picture that pixels are told for: a common one, so that numbers compare. */
const ROWS = 1080;
/** Beyond this the old picture's middle is out of every lens's view, and no count of pixels says more. */
const OUT_OF_VIEW = 60;
/** Parents that are walked up: no scene is deeper, and a file made to hurt costs no more. */
const DEEPEST = 512;

/**
 * What an offset of `degrees` of a node looks like at rest. Of a node that carries a camera, or whose nearest descendants do: pixels
 * in the middle of a picture 1,080 high, tan(θ)·(1080/2)/tan(view/2), the view its vertical angle. Of any other: millimetres that its farthest descendant
 * moves, 2·sin(θ/2)·distance. Undefined where the tree tells neither.
 *
 * @param metres metres in one unit of the tree; undefined where the file does not say
 */
export function visibleEffect(
  degrees: number,
  nodes: readonly SceneNode[],
  node: number,
  metres: number | undefined,
): VisibleEffect | undefined {
  const { view, arm } = rest(nodes)[node] ?? {};
  if (view !== undefined) {
    const pixels = (Math.tan(Math.min(degrees, OUT_OF_VIEW) * RADIANS) * ROWS) / 2 / Math.tan(view / 2);
    return { value: significant(Math.min(pixels, ROWS)), unit: 'px' };
  }
  if (metres === undefined || arm === undefined || !(arm > 0) || !Number.isFinite(arm)) return undefined;
  const moved = 2 * Math.sin((Math.min(degrees, 180) * RADIANS) / 2) * arm * metres * 1000;
  return { value: significant(moved), unit: 'mm' };
}

interface AtRest {
  /** Vertical view angle of the camera that turns along, radians. */
  readonly view?: number;
  /** Distance to the farthest descendant, in units of the tree. */
  readonly arm: number;
}

const known = new WeakMap<readonly SceneNode[], readonly AtRest[]>();

function rest(nodes: readonly SceneNode[]): readonly AtRest[] {
  const before = known.get(nodes);
  if (before !== undefined) return before;
  const all = measuredAtRest(nodes);
  known.set(nodes, all);
  return all;
}

function measuredAtRest(nodes: readonly SceneNode[]): readonly AtRest[] {
  const places = worldPlaces(nodes);
  const arms = new Float64Array(nodes.length);
  const views = new Map<number, number>();
  for (const [index, { camera }] of nodes.entries()) {
    let above = index;
    for (let steps = 0; above >= 0 && steps < DEEPEST; steps++) {
      if (camera !== undefined && !views.has(above)) views.set(above, camera.verticalView);
      arms[above] = Math.max(arms[above] ?? 0, apart(places, index, above));
      above = nodes[above]?.parent ?? -1;
    }
  }
  return nodes.map((node, index) => {
    const view = node.camera?.verticalView ?? views.get(index);
    return { ...(view !== undefined && { view }), arm: arms[index] ?? 0 };
  });
}

function apart(places: Float64Array, a: number, b: number): number {
  const [x = 0, y = 0, z = 0] = [0, 1, 2].map((i) => (places[3 * a + i] ?? 0) - (places[3 * b + i] ?? 0));
  return Math.hypot(x, y, z);
}

/** Where every node stands at rest, in units of the tree, three numbers a node. A parent may be listed after its children. */
function worldPlaces(nodes: readonly SceneNode[]): Float64Array {
  const matrices: Float64Array[] = [];
  const places = new Float64Array(3 * nodes.length);
  for (let index = 0; index < nodes.length; index++) {
    const way: number[] = [];
    for (
      let at = index;
      at >= 0 && matrices[at] === undefined && way.length <= nodes.length;
      at = nodes[at]?.parent ?? -1
    )
      way.push(at);
    for (const at of way.toReversed()) {
      const node = nodes[at]!;
      const own = ownMatrix(node);
      const parent = matrices[node.parent];
      matrices[at] = parent === undefined ? own : product(parent, own);
      places.set(matrices[at].subarray(9), 3 * at);
    }
  }
  return places;
}

/** Three columns and a translation, twelve numbers. */
function ownMatrix({ rotation, translation, scale }: SceneNode): Float64Array {
  const [x = 0, y = 0, z = 0, w = 1] = rotation;
  const [a = 1, b = 1, c = 1] = scale;
  const length = x * x + y * y + z * z + w * w;
  const s = length > 0 ? 2 / length : 0;
  return Float64Array.of(
    a * (1 - s * (y * y + z * z)),
    a * s * (x * y + w * z),
    a * s * (x * z - w * y),
    b * s * (x * y - w * z),
    b * (1 - s * (x * x + z * z)),
    b * s * (y * z + w * x),
    c * s * (x * z + w * y),
    c * s * (y * z - w * x),
    c * (1 - s * (x * x + y * y)),
    ...[0, 1, 2].map((i) => translation[i] ?? 0),
  );
}

function product(parent: Float64Array, own: Float64Array): Float64Array {
  const out = new Float64Array(12);
  for (let column = 0; column < 4; column++)
    for (let row = 0; row < 3; row++) {
      let sum = column === 3 ? (parent[9 + row] ?? 0) : 0;
      for (let i = 0; i < 3; i++) sum += (parent[3 * i + row] ?? 0) * (own[3 * column + i] ?? 0);
      out[3 * column + row] = sum;
    }
  return out;
}
