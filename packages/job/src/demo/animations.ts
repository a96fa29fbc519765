import type { DemoTrack } from './demo-track.js';

const FLOAT = 5126;
const BYTE = 5120;

/** The animated part of a glTF file: its JSON arrays and the bytes that they point into. */
export interface PackedAnimations {
  readonly animations: readonly object[];
  readonly accessors: readonly object[];
  readonly bufferViews: readonly object[];
  readonly binary: Uint8Array;
}

/**
 * One animation of one LINEAR rotation channel for each track. Times and values are float32; a track of int8 storage has
 * normalised signed bytes. Floats stand before bytes, so every accessor starts on its own alignment.
 */
export function packAnimations(
  tracks: readonly DemoTrack[],
  nodeIndex: (name: string) => number,
): PackedAnimations {
  const floats: number[] = [];
  const bytes: number[] = [];
  const accessors: object[] = [];
  const store = (into: number[], numbers: readonly number[], accessor: object): number => {
    const byteOffset = into.length * (into === floats ? 4 : 1);
    into.push(...numbers);
    return accessors.push({ bufferView: into === floats ? 0 : 1, byteOffset, ...accessor }) - 1;
  };
  const animations = tracks.map((track) => {
    const count = track.times.length;
    const bounds = {
      min: [Math.fround(track.times[0] ?? 0)],
      max: [Math.fround(track.times[count - 1] ?? 0)],
    };
    const input = store(floats, track.times, { componentType: FLOAT, count, type: 'SCALAR', ...bounds });
    const values = track.orientations.flat();
    const output =
      track.storage === 'float32'
        ? store(floats, values, { componentType: FLOAT, count, type: 'VEC4' })
        : store(bytes, values.map(asByte), { componentType: BYTE, normalized: true, count, type: 'VEC4' });
    return {
      name: track.clip,
      samplers: [{ input, interpolation: 'LINEAR', output }],
      channels: [{ sampler: 0, target: { node: nodeIndex(track.node), path: 'rotation' } }],
    };
  });
  const floatBytes = littleEndian(floats);
  const binary = new Uint8Array(floatBytes.length + bytes.length);
  binary.set(floatBytes);
  binary.set(Int8Array.from(bytes), floatBytes.length);
  const bufferViews = [
    { buffer: 0, byteLength: floatBytes.length },
    { buffer: 0, byteOffset: floatBytes.length, byteLength: bytes.length },
  ];
  return { animations, accessors, bufferViews, binary };
}

/** The signed byte for a number in [-1, 1] (glTF 2.0, "Animations": round(f × 127)). */
function asByte(value: number): number {
  return Math.round(value * 127);
}

function littleEndian(numbers: readonly number[]): Uint8Array {
  const bytes = new Uint8Array(4 * numbers.length);
  const view = new DataView(bytes.buffer);
  numbers.forEach((number, i) => view.setFloat32(4 * i, number, true));
  return bytes;
}
