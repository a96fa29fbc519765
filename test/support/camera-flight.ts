import { angleBetween, lookAlong, playAs } from '@slewcurve/core';
import { bufferSource } from '@slewcurve/formats';
import { openFile } from '@slewcurve/job';
import { type GltfJson, Packer, glb, jsonOf } from './gltf-bytes.js';
import { trackOf } from './mended.js';

const DEGREES = 180 / Math.PI;

const TARGET = [2, 1, -6] as const;
/** Where the camera flies, in one second more or less at a walking pace, faster and slower. */
function placeAt(t: number): [number, number, number] {
  const u = t + 0.35 * Math.sin(2 * t);
  return [3 * Math.cos(0.5 * u), 1.5 + 0.4 * Math.sin(u), 3 * Math.sin(0.5 * u)];
}

/** d/dt of the place by a central difference. */
function slope(t: number): number[] {
  return placeAt(t + 1e-4).map((part, i) => (part - placeAt(t - 1e-4)[i]) / 2e-4);
}

function aimAt(t: number): number[] {
  const place = placeAt(t);
  return lookAlong(
    [],
    TARGET.map((part, i) => part - place[i]),
    [0, 1, 0],
  );
}

type Mode = 'LINEAR' | 'CUBICSPLINE';

/** A GLB: a camera that flies past a target and points at it, and a second node with a turn and a place of its own. */
export function flight(placeMode: Mode = 'LINEAR', hertz = 25, seconds = 4): Uint8Array {
  const packer = new Packer();
  const times = Array.from({ length: hertz * seconds + 1 }, (_, key) => key / hertz);
  const input = packer.add('SCALAR', times);
  const rotations = packer.add('VEC4', times.flatMap(aimAt));
  const places = packer.add(
    'VEC3',
    times.flatMap((t) => (placeMode === 'LINEAR' ? placeAt(t) : [...slope(t), ...placeAt(t), ...slope(t)])),
  );
  const boat = packer.add(
    'VEC3',
    times.flatMap((t) => [t, 0, 0]),
  );
  const boatTurn = packer.add(
    'VEC4',
    times.flatMap((t) => [0, 0, Math.sin(t / 9), Math.cos(t / 9)]),
  );
  const json: GltfJson = {
    ...packer.json,
    nodes: [{ name: 'camera' }, { name: 'boat' }],
    animations: [
      {
        name: 'Flight',
        samplers: [
          { input, output: rotations },
          { input, output: places, interpolation: placeMode },
          { input, output: boat },
          { input, output: boatTurn },
        ],
        channels: [
          { sampler: 0, target: { node: 0, path: 'rotation' } },
          { sampler: 1, target: { node: 0, path: 'translation' } },
          { sampler: 2, target: { node: 1, path: 'translation' } },
          { sampler: 3, target: { node: 1, path: 'rotation' } },
        ],
      },
    ],
  };
  return glb(json, packer.data);
}

/** Its camera's track. */
export const CAMERA = { clip: 'Flight', track: 'camera' };

/** Times and values of a sampler, read the plain way. */
export function samplerOf(
  bytes: Uint8Array,
  index: number,
): { times: Float32Array; values: Float32Array; mode: string } {
  const json = jsonOf(bytes);
  const jsonLength = new DataView(bytes.buffer, bytes.byteOffset).getUint32(12, true);
  const numbers = (accessor: number): Float32Array => {
    const { bufferView, count, type, byteOffset = 0 } = json.accessors[accessor];
    const at = 28 + jsonLength + (json.bufferViews[bufferView].byteOffset ?? 0) + byteOffset;
    const width = { SCALAR: 1, VEC3: 3, VEC4: 4 }[String(type)] ?? 0;
    return new Float32Array(bytes.slice(at, at + 4 * count * width).buffer);
  };
  const channel = json.animations[0].channels[index];
  const { input, output, interpolation = 'LINEAR' } = json.animations[0].samplers[channel.sampler];
  return { times: numbers(input), values: numbers(output), mode: interpolation };
}

/** A place of a VEC3 sampler at a time, as glTF 2.0 says. */
function sampled({ times, values, mode }: ReturnType<typeof samplerOf>, t: number): number[] {
  let i = 0;
  while (i < times.length - 2 && times[i + 1] <= t) i++;
  const h = times[i + 1] - times[i];
  const u = Math.max(0, Math.min(1, (t - times[i]) / h));
  return [0, 1, 2].map((k) => {
    if (mode === 'LINEAR') return values[3 * i + k] * (1 - u) + values[3 * i + 3 + k] * u;
    const [a, b] = [9 * i, 9 * (i + 1)];
    const p = u * u * (3 - 2 * u);
    const q = u * (1 - u);
    return (
      (1 - p) * values[a + 3 + k] +
      p * values[b + 3 + k] +
      h * q * ((1 - u) * values[a + 6 + k] - u * values[b + k])
    );
  });
}

/** Worst angle between where the camera looks and where the target is, degrees. */
export async function pointingError(bytes: Uint8Array): Promise<number> {
  const { file } = await openFile(bufferSource(bytes), { name: 'flight.glb' });
  const curve = playAs(trackOf(file, 'Flight', 'camera'), 'as-written');
  const place = samplerOf(bytes, 1);
  let worst = 0;
  for (let i = 0; i <= 800; i++) {
    const t = curve.start + (i / 800) * (curve.end - curve.start);
    const at = sampled(place, t);
    const wanted = lookAlong(
      [],
      TARGET.map((part, k) => part - at[k]),
      [0, 1, 0],
    );
    const own = curve.orientation([0, 0, 0, 0], t);
    worst = Math.max(worst, angleBetween(own, wanted));
  }
  return worst * DEGREES;
}
