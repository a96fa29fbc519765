/** JSON of a glTF asset that is being built; loose, since tests build broken ones too. */
export type GltfJson = Record<string, unknown>;

export type Component = 'float' | 'byte' | 'ubyte' | 'short' | 'ushort';

const COMPONENTS = {
  float: { code: 5126, Store: Float32Array, top: 1 },
  byte: { code: 5120, Store: Int8Array, top: 127 },
  ubyte: { code: 5121, Store: Uint8Array, top: 255 },
  short: { code: 5122, Store: Int16Array, top: 32_767 },
  ushort: { code: 5123, Store: Uint16Array, top: 65_535 },
} as const;

const WIDTHS: Readonly<Record<string, number>> = { SCALAR: 1, VEC3: 3, VEC4: 4 };

/** Collects numbers into one buffer with a view and an accessor each. */
export class Packer {
  readonly accessors: GltfJson[] = [];
  readonly bufferViews: GltfJson[] = [];
  readonly #parts: Uint8Array[] = [];
  #length = 0;

  /** Adds bytes at a multiple of four; the number of their view. */
  view(bytes: Uint8Array, more: GltfJson = {}): number {
    const padded = new Uint8Array(Math.ceil(bytes.byteLength / 4) * 4);
    padded.set(bytes);
    this.bufferViews.push({ buffer: 0, byteOffset: this.#length, byteLength: bytes.byteLength, ...more });
    this.#parts.push(padded);
    this.#length += padded.byteLength;
    return this.bufferViews.length - 1;
  }

  /** Adds numbers with a view of their own; the number of their accessor. SCALAR gets bounds, as times need. */
  add(
    type: 'SCALAR' | 'VEC3' | 'VEC4',
    numbers: readonly number[],
    component: Component = 'float',
    more: GltfJson = {},
  ): number {
    const { code, Store, top } = COMPONENTS[component];
    const store = Store.from(component === 'float' ? numbers : numbers.map((x) => Math.round(x * top)));
    const bytes = new Uint8Array(store.buffer, store.byteOffset, store.byteLength);
    this.accessors.push({
      bufferView: this.view(bytes),
      componentType: code,
      count: numbers.length / WIDTHS[type],
      type,
      ...(component !== 'float' && { normalized: true }),
      ...(type === 'SCALAR' && { min: [Math.min(...store)], max: [Math.max(...store)] }),
      ...more,
    });
    return this.accessors.length - 1;
  }

  get data(): Uint8Array {
    const data = new Uint8Array(this.#length);
    let at = 0;
    for (const part of this.#parts) {
      data.set(part, at);
      at += part.byteLength;
    }
    return data;
  }

  /** The members of an asset that describe what was packed, with no URI. */
  get json(): GltfJson {
    return {
      asset: { version: '2.0' },
      accessors: this.accessors,
      bufferViews: this.bufferViews,
      buffers: [{ byteLength: this.#length }],
    };
  }
}

/** A GLB of JSON (a value, or text to be kept to the byte) and a binary chunk. */
export function glb(json: GltfJson | string, bin?: Uint8Array): Uint8Array {
  const text = new TextEncoder().encode(typeof json === 'string' ? json : JSON.stringify(json));
  const jsonLength = Math.ceil(text.byteLength / 4) * 4;
  const binLength = bin ? Math.ceil(bin.byteLength / 4) * 4 : 0;
  const size = 20 + jsonLength + (bin ? 8 + binLength : 0);
  const bytes = new Uint8Array(size);
  const view = new DataView(bytes.buffer);
  bytes.fill(0x20, 20, 20 + jsonLength);
  bytes.set(text, 20);
  [0x46546c67, 2, size, jsonLength, 0x4e4f534a].forEach((word, i) => view.setUint32(i * 4, word, true));
  if (bin) {
    view.setUint32(20 + jsonLength, binLength, true);
    view.setUint32(24 + jsonLength, 0x004e4942, true);
    bytes.set(bin, 28 + jsonLength);
  }
  return bytes;
}

/** A `.gltf` of JSON. */
export function gltf(json: GltfJson | string): Uint8Array {
  return new TextEncoder().encode(typeof json === 'string' ? json : JSON.stringify(json));
}

/** The JSON of a GLB or a `.gltf`, read the plain way. */
export function jsonOf(bytes: Uint8Array): any {
  const isGlb = bytes[0] === 0x67;
  const length = new DataView(bytes.buffer, bytes.byteOffset).getUint32(12, true);
  return JSON.parse(new TextDecoder().decode(isGlb ? bytes.subarray(20, 20 + length) : bytes));
}

/** `[x, y, z, w]` of a turn about z, degrees. */
export function aboutZ(degrees: number): number[] {
  const half = (degrees * Math.PI) / 360;
  return [0, 0, Math.sin(half), Math.cos(half)];
}

/** One node turned about z by a clip called Turn. */
export function oneTrack(
  degrees: readonly number[],
  { times, component }: { times?: readonly number[]; component?: Component } = {},
): Packer & { asset: GltfJson } {
  const packer = new Packer();
  const input = packer.add('SCALAR', times ?? degrees.map((_, key) => key / 24));
  const output = packer.add('VEC4', degrees.flatMap(aboutZ), component);
  return Object.assign(packer, {
    asset: {
      ...packer.json,
      nodes: [{ name: 'Mast' }],
      animations: [
        {
          name: 'Turn',
          channels: [{ sampler: 0, target: { node: 0, path: 'rotation' } }],
          samplers: [{ input, output }],
        },
      ],
    },
  });
}
