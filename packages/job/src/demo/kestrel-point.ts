import { packAnimations } from './animations.js';
import { beetleTracks } from './beetle.js';
import { craneTracks } from './crane.js';
import { writeGlb } from './glb-writer.js';
import { headland } from './headland.js';
import { lensTracks } from './lens.js';
import { quayTracks } from './quay.js';
import { scopeTracks } from './scope.js';
import { vaneTracks } from './vane.js';

/**
 * The demo scene "Kestrel Point" as a binary glTF file without meshes: a headland with a lighthouse, a harbour crane with a camera
 * head, an observatory, a camera on the quay, a six-legged beetle and a weather vane. Twelve clips of one rotation track each, most
 * with a fault planted in them. Made from formulas and a fixed seed: the same bytes at every call.
 */
export function kestrelPoint(): Uint8Array {
  const { nodes, cameras, skins, names } = headland();
  const tracks = [
    ...lensTracks(),
    ...craneTracks(),
    ...scopeTracks(),
    ...quayTracks(),
    ...beetleTracks(),
    ...vaneTracks(),
  ];
  const { binary, ...animated } = packAnimations(tracks, (name) => names.indexOf(name));
  return writeGlb(
    {
      asset: { version: '2.0', generator: 'Slewcurve' },
      scene: 0,
      scenes: [{ name: 'Kestrel Point', nodes: [0] }],
      nodes,
      cameras,
      skins,
      ...animated,
    },
    binary,
  );
}
