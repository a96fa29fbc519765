// Where every node stands in the world at rest, by glTF-Transform (4.5.1, MIT): joints in joints, matrices, cameras. What a turn moves in
// the world, and by how much at a limb's tip, comes from this tree.
import { WebIO } from '@gltf-transform/core';
import { expect, test } from 'vitest';
import { rotateVector, type SceneNode } from '@slewcurve/core';
import { bufferSource, openAnimation } from '@slewcurve/formats';
import { glb } from '../support/gltf-bytes.js';
import { seededRandom, randomQuaternion } from '../support/seeded-random.js';
import { sharedFile } from '../support/shared-data.js';

/** Place of a node's origin in the world: parents' scale, turn and shift, from the node up. */
function originOf(nodes: readonly SceneNode[], index: number): number[] {
  let place = [0, 0, 0];
  for (let at = index; at !== -1; at = nodes[at].parent) {
    const { scale, rotation, translation } = nodes[at];
    const turned = rotateVector(
      [0, 0, 0],
      rotation,
      place.map((x, i) => x * scale[i]),
    );
    place = Array.from(turned, (x, i) => x + translation[i]);
  }
  return place;
}

async function compare(bytes: Uint8Array, within: number): Promise<number> {
  const { nodes } = await openAnimation(bufferSource(bytes), { name: 'rig.glb' });
  const document = await new WebIO().readBinary(bytes);
  const theirs = document.getRoot().listNodes();
  expect(nodes).toHaveLength(theirs.length);
  theirs.forEach((node, index) => {
    node.getWorldTranslation().forEach((x, axis) => {
      expect(Math.abs(x - originOf(nodes, index)[axis])).toBeLessThan(within);
    });
  });
  const joints = new Set(
    document
      .getRoot()
      .listSkins()
      .flatMap((skin) => skin.listJoints()),
  );
  expect(nodes.map(({ joint }) => joint)).toEqual(theirs.map((node) => joints.has(node)));
  return nodes.length;
}

test('a tree of thirty nodes with turns, even scales and a camera', async () => {
  const random = seededRandom(30);
  const nodes = Array.from({ length: 30 }, (_, index) => ({
    name: `node-${index}`,
    rotation: randomQuaternion(random),
    translation: [random(), 2 * random(), -random()],
    scale: [1, 1, 1].map(() => 0.5 + (index % 3) / 2),
    children: [2 * index + 1, 2 * index + 2].filter((child) => child < 30),
    ...(index === 17 && { camera: 0 }),
  })).map(({ children, ...node }) => (children.length > 0 ? { ...node, children } : node));
  const json = {
    asset: { version: '2.0' },
    scene: 0,
    scenes: [{ nodes: [0] }],
    nodes,
    cameras: [{ type: 'perspective', perspective: { yfov: 0.7, aspectRatio: 1.5, znear: 0.1 } }],
    skins: [{ joints: [3, 7, 8] }],
  };
  // Float64 on both sides, five levels deep.
  expect(await compare(glb(json), 1e-12)).toBe(30);
});

const names = ['adventurer-9clips', '840-joints', 'two-joint-bend'].map(
  (name) => `data/gltf/animation-only/${name}.glb`,
);

test.each(names.filter((name) => !sharedFile(name).absent))('%s', async (name) => {
  // Numbers of up to a few hundred in JSON; float64 again.
  expect(await compare(sharedFile(name).read(), 1e-6)).toBeGreaterThan(0);
});
