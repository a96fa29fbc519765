import { type SceneNode, SlewcurveError, splitMatrix } from '@slewcurve/core';
import {
  type Json,
  countMember,
  isObject,
  listMember,
  member,
  numbersMember,
  shown,
  textMember,
} from '../json-value.js';
import { nodePaths } from '../node-paths.js';
import type { Container } from './container.js';
import { problem } from './problem.js';
import type { Problems } from './problem-list.js';

/** The node tree at rest, in the file's own order. Whatever can't be a tree is cut and reported. */
export function nodeTree(container: Container, problems: Problems): SceneNode[] {
  const nodes = listMember(container.json, 'nodes');
  const parents = parentsOf(container, nodes, problems);
  const paths = nodePaths(
    nodes.map((node) => textMember(node, 'name')),
    parents,
  );
  const joints = new Set<Json>(
    listMember(container.json, 'skins').flatMap((skin) => listMember(skin, 'joints')),
  );
  const cameras = listMember(container.json, 'cameras');
  return nodes.map((node, index) => {
    const name = textMember(node, 'name');
    const camera = perspective(cameras[countMember(node, 'camera') ?? -1]);
    return {
      path: paths[index] ?? `#${index}`,
      ...(name !== undefined && { name }),
      parent: parents[index] ?? -1,
      ...restPose(container, node, index, problems),
      joint: joints.has(index),
      ...(camera && { camera }),
    };
  });
}

/** Parent of every node, -1 at roots. The first parent that claims a node keeps it; a ring is cut at its first node. */
function parentsOf(container: Container, nodes: readonly Json[], problems: Problems): number[] {
  const parents = nodes.map(() => -1);
  nodes.forEach((node, parent) => {
    const children = member(node, 'children');
    if (children !== undefined && !Array.isArray(children))
      problems.push(
        problem(
          container,
          'gltf.bad-children',
          `/nodes/${parent}/children`,
          `must be a list; it is ${shown(children)}.`,
        ),
      );
    listMember(node, 'children').forEach((child, i) => {
      const pointer = `/nodes/${parent}/children/${i}`;
      if (typeof child !== 'number' || !isObject(nodes[child]))
        problems.push(
          problem(
            container,
            'gltf.no-node',
            pointer,
            `names node ${shown(child)}; there are ${nodes.length}.`,
          ),
        );
      else if (parents[child] !== -1)
        problems.push(
          problem(
            container,
            'gltf.two-parents',
            pointer,
            `names node ${child}, whose parent is ${parents[child]} already.`,
          ),
        );
      else parents[child] = parent;
    });
  });
  cutRings(container, parents, problems);
  return parents;
}

function cutRings(container: Container, parents: number[], problems: Problems): void {
  // 0 not seen, 1 on the way up that is being walked, 2 known to end at a root.
  const state = new Uint8Array(parents.length);
  for (let start = 0; start < parents.length; start++) {
    const way: number[] = [];
    let node = start;
    while (node !== -1 && state[node] === 0) {
      state[node] = 1;
      way.push(node);
      node = parents[node] ?? -1;
    }
    if (node !== -1 && state[node] === 1) {
      problems.push(
        problem(container, 'gltf.node-ring', `/nodes/${node}`, 'is its own ancestor; it is read as a root.'),
      );
      parents[node] = -1;
    }
    for (const passed of way) state[passed] = 2;
  }
}

type RestPose = Pick<SceneNode, 'rotation' | 'translation' | 'scale' | 'matrix'>;

function restPose(container: Container, node: Json, index: number, problems: Problems): RestPose {
  const matrix = numbersMember(node, 'matrix', 16);
  if (matrix) return poseOfMatrix(container, matrix, index, problems);
  return {
    rotation: numbersMember(node, 'rotation', 4) ?? [0, 0, 0, 1],
    translation: numbersMember(node, 'translation', 3) ?? [0, 0, 0],
    scale: numbersMember(node, 'scale', 3) ?? [1, 1, 1],
  };
}

function poseOfMatrix(
  container: Container,
  matrix: readonly number[],
  index: number,
  problems: Problems,
): RestPose {
  try {
    const { orientation, translation, scale, reflected, shear } = splitMatrix(matrix);
    return { rotation: orientation, translation, scale, matrix: { reflected, shear } };
  } catch (error) {
    if (!(error instanceof SlewcurveError)) throw error;
    problems.push(
      problem(
        container,
        'gltf.flat-matrix',
        `/nodes/${index}/matrix`,
        `holds no orientation; the node is read as not turned.`,
      ),
    );
    const scale = [0, 4, 8].map((column) => Math.hypot(...matrix.slice(column, column + 3)));
    return { rotation: [0, 0, 0, 1], translation: matrix.slice(12, 15), scale };
  }
}

function perspective(camera: Json | undefined): SceneNode['camera'] {
  const view = member(camera, 'perspective');
  const verticalView = member(view, 'yfov');
  if (typeof verticalView !== 'number' || !(verticalView > 0)) return undefined;
  const aspect = member(view, 'aspectRatio');
  return { verticalView, ...(typeof aspect === 'number' && aspect > 0 && { aspect }) };
}
