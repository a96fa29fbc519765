import { LEGS, bent } from './beetle.js';
import type { Orientation } from './demo-track.js';

/** A thing on the headland with what stands or hangs on it. Metres, parent axes. */
interface Place {
  readonly name: string;
  readonly translation: readonly [number, number, number];
  readonly rotation?: Orientation;
  /** Camera looking along its own -Z. */
  readonly camera?: { readonly yfov: number };
  readonly children?: readonly Place[];
}

/** The node arrays of the scene's glTF. */
export interface Headland {
  readonly nodes: readonly object[];
  readonly cameras: readonly object[];
  readonly skins: readonly object[];
  readonly names: readonly string[];
}

const ASPECT = 16 / 9;

/** The left fore leg is the first; feet stand on the ground 0.5 m beside the body. */
function leg(name: string, index: number): Place {
  const side = index < 3 ? -1 : 1;
  const ankle: Place = {
    name: `${name}-ankle`,
    translation: [side * 0.1, -0.4, 0],
    children: [{ name: `${name}-foot`, translation: [0, -0.15, 0.05] }],
  };
  const knee: Place = {
    name: `${name}-knee`,
    translation: [side * 0.3, 0.1, 0],
    rotation: bent(-25),
    children: [ankle],
  };
  return { name: `${name}-hip`, translation: [side * 0.2, 0, 0.4 - 0.4 * (index % 3)], children: [knee] };
}

const SCENE: Place = {
  name: 'headland',
  translation: [0, 0, 0],
  children: [
    {
      name: 'lighthouse',
      translation: [-40, 0, -30],
      children: [{ name: 'lens', translation: [0, 24, 0] }],
    },
    {
      name: 'harbour-crane',
      translation: [35, 0, 10],
      children: [
        {
          name: 'jib',
          translation: [0, 30, 0],
          children: [{ name: 'crane-head', translation: [0, -1, -18], camera: { yfov: 0.6 } }],
        },
      ],
    },
    {
      name: 'observatory',
      translation: [-10, 12, -60],
      children: [
        {
          name: 'scope',
          translation: [0, 4, 0],
          children: [{ name: 'aperture', translation: [0, 0, -2.5] }],
        },
      ],
    },
    {
      name: 'quay',
      translation: [20, 1, 30],
      children: [{ name: 'quay-camera', translation: [0, 3, 0], camera: { yfov: Math.PI / 4 } }],
    },
    {
      name: 'beetle',
      translation: [4, 0.5, 6],
      children: LEGS.map(leg),
    },
    {
      name: 'mast',
      translation: [-5, 0, -8],
      children: [
        {
          name: 'weather-vane',
          translation: [0, 9, 0],
          children: [{ name: 'arrow-head', translation: [0, 0, -0.8] }],
        },
      ],
    },
  ],
};

/** The scene's nodes in glTF's shape, parents before children, with its cameras and the beetle's skin. */
export function headland(): Headland {
  const nodes: object[] = [];
  const names: string[] = [];
  const cameras: object[] = [];
  const add = (place: Place): number => {
    const index = names.push(place.name) - 1;
    const { name, translation, rotation } = place;
    nodes.push({});
    const camera = place.camera && cameras.push(perspective(name, place.camera.yfov)) - 1;
    const children = place.children?.map(add);
    nodes[index] = {
      name,
      translation,
      ...(rotation && { rotation }),
      ...(camera !== undefined && { camera }),
      ...(children && { children }),
    };
    return index;
  };
  add(SCENE);
  const joints = LEGS.flatMap((name) =>
    ['hip', 'knee', 'ankle'].map((part) => names.indexOf(`${name}-${part}`)),
  );
  return {
    nodes,
    cameras,
    names,
    // No mesh hangs on it yet: it says which nodes are joints.
    skins: [{ name: 'beetle', skeleton: names.indexOf('beetle'), joints }],
  };
}

function perspective(name: string, yfov: number): object {
  return { name, type: 'perspective', perspective: { aspectRatio: ASPECT, yfov, znear: 0.1, zfar: 2000 } };
}
