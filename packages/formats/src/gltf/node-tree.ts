import { type SceneNode, SlewcurveError, splitMatrix } from '@slewcurve/core';
import {
  type Json,
  countMember,
  listMember,
  member,
  numbersMember,
  shown,
  textMember,
} from '../json-value.js';
import type { Container } from './container.js';
import { type Problem, problem } from './problem.js';

/** A path longer than this starts anew at the node's number: a chain of nodes can't make paths grow without bound. */
const LONGEST_PATH = 4096;
const LONGEST_NAME = 512;

/** The node tree at rest, in the file's own order. Whatever can't be a tree is cut and reported. */
export function nodeTree(container: Container, problems: Problem[]): SceneNode[] {
  const nodes = listMember(container.json, 'nodes');
  const parents = parentsOf(container, nodes, problems);
  const paths = pathsOf(nodes, parents);
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
function parentsOf(container: Container, nodes: readonly Json[], problems: Problem[]): number[] {
  const parents = nodes.map(() => -1);
  nodes.forEach((node, parent) => {
    listMember(node, 'children').forEach((child, i) => {
      const pointer = `/nodes/${parent}/children/${i}`;
      if (typeof child !== 'number' || parents[child] === undefined)
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

function cutRings(container: Container, parents: number[], problems: Problem[]): void {
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

/** Paths by name: `~` and `/` escaped, `[n]` on every one of equal siblings, `#n` where nameless. */
function pathsOf(nodes: readonly Json[], parents: readonly number[]): string[] {
  const labels = siblingLabels(nodes, parents);
  const paths: string[] = [];
  const path = (index: number): string | undefined => paths[index];
  for (let start = 0; start < nodes.length; start++) {
    const way: number[] = [];
    for (let node = start; node !== -1 && path(node) === undefined; node = parents[node] ?? -1)
      way.push(node);
    for (let node = way.pop(); node !== undefined; node = way.pop()) {
      const above = path(parents[node] ?? -1);
      const label = labels[node] ?? `#${node}`;
      const full = above === undefined ? label : `${above}/${label}`;
      paths[node] = full.length > LONGEST_PATH ? `#${node}` : full;
    }
  }
  return paths;
}

function siblingLabels(nodes: readonly Json[], parents: readonly number[]): string[] {
  const families = new Map<number, number[]>();
  parents.forEach((parent, index) => {
    const family = families.get(parent);
    if (family) family.push(index);
    else families.set(parent, [index]);
  });
  const labels: string[] = nodes.map((_, index) => `#${index}`);
  for (const family of families.values()) {
    const names = family.map((index) => textMember(nodes[index], 'name'));
    const unique = uniqueLabels(
      names.map((name) => name && escapeName(name)),
      (i) => `#${family[i]}`,
    );
    family.forEach((index, i) => (labels[index] = unique[i] ?? `#${index}`));
  }
  return labels;
}

function escapeName(name: string): string {
  const cut = name.length > LONGEST_NAME ? `${name.slice(0, LONGEST_NAME)}…` : name;
  return cut.replaceAll('~', '~0').replaceAll('/', '~1');
}

/**
 * One label each, no two alike: a name that stands alone is its own label, every one of equal names gets `[n]` in their
 * order, and a missing or empty name gets the number that `nameless` gives.
 */
export function uniqueLabels(
  names: readonly (string | undefined)[],
  nameless: (index: number) => string,
): string[] {
  const wanted = names.map((name, i) => name || nameless(i));
  const counts = new Map<string, number>();
  for (const label of wanted) counts.set(label, (counts.get(label) ?? 0) + 1);
  const taken = new Set(wanted.filter((label, i) => counts.get(label) === 1 || !names[i]));
  const next = new Map<string, number>();
  return wanted.map((label, i) => {
    if (counts.get(label) === 1 || !names[i]) return label;
    let n = next.get(label) ?? 0;
    while (taken.has(`${label}[${n}]`)) n++;
    next.set(label, n + 1);
    taken.add(`${label}[${n}]`);
    return `${label}[${n}]`;
  });
}

type RestPose = Pick<SceneNode, 'rotation' | 'translation' | 'scale'>;

function restPose(container: Container, node: Json, index: number, problems: Problem[]): RestPose {
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
  problems: Problem[],
): RestPose {
  try {
    const { orientation, translation, scale } = splitMatrix(matrix);
    return { rotation: orientation, translation, scale };
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
