// A second reading of glTF 2.0 animations, from the text of the specification alone: it imports nothing of the packages, so that what
// they write can be held against it. Float and normalised integer rotations in a GLB's own BIN chunk; no sparse accessors.
// Source: Khronos Group, glTF 2.0 specification, sections 3.6.2 (accessors), 3.11 (animations), 4 (GLB), appendix C (interpolation).

/** One rotation sampler as the file has it. */
export interface RotationSampler {
  readonly clip: string;
  readonly node: number;
  readonly interpolation: string;
  readonly times: readonly number[];
  /** Four numbers a key, twelve under CUBICSPLINE. */
  readonly output: readonly number[];
}

interface Accessor {
  readonly bufferView: number;
  readonly byteOffset?: number;
  readonly componentType: number;
  readonly count: number;
  readonly type: string;
}

interface Json {
  readonly accessors: readonly Accessor[];
  readonly bufferViews: readonly { readonly byteOffset?: number; readonly byteStride?: number }[];
  readonly animations: readonly {
    readonly name: string;
    readonly channels: readonly {
      readonly sampler: number;
      readonly target: { readonly node: number; readonly path: string };
    }[];
    readonly samplers: readonly {
      readonly input: number;
      readonly output: number;
      readonly interpolation?: string;
    }[];
  }[];
  readonly nodes: readonly { readonly name?: string }[];
}

/** JSON and BIN of a GLB. */
export function glbChunks(bytes: Uint8Array): { readonly json: Json; readonly bin: DataView } {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const length = view.getUint32(12, true);
  const json: Json = JSON.parse(new TextDecoder().decode(bytes.subarray(20, 20 + length)));
  const at = 20 + length;
  const size = view.getUint32(at, true);
  return { json, bin: new DataView(bytes.buffer, bytes.byteOffset + at + 8, size) };
}

/** Every rotation sampler of a GLB, in the file's order. */
export function rotationSamplers(bytes: Uint8Array): RotationSampler[] {
  const { json, bin } = glbChunks(bytes);
  return json.animations.flatMap((animation) =>
    animation.channels
      .filter(({ target }) => target.path === 'rotation')
      .map(({ sampler, target }): RotationSampler => {
        const { input, output, interpolation = 'LINEAR' } = animation.samplers[sampler];
        return {
          clip: animation.name,
          node: target.node,
          interpolation,
          times: numbersOf(json, bin, input),
          output: numbersOf(json, bin, output),
        };
      }),
  );
}

/** The orientation that the specification's formula gives at a time, normalised. `from`: a key at or before it, to look from. */
export function sampleAt({ times, output, interpolation }: RotationSampler, t: number, from = 0): number[] {
  const last = times.length - 1;
  const size = interpolation === 'CUBICSPLINE' ? 12 : 4;
  const valueOf = (key: number): number[] =>
    output.slice(key * size + (size === 12 ? 4 : 0), key * size + (size === 12 ? 8 : 4));
  if (t <= times[0]) return unit(valueOf(0));
  if (t >= times[last]) return unit(valueOf(last));
  let k = from;
  while (times[k + 1] <= t) k++;
  const td = times[k + 1] - times[k];
  const u = (t - times[k]) / td;
  const a = valueOf(k);
  const b = valueOf(k + 1);
  if (u === 0 || interpolation === 'STEP') return unit(a);
  if (size === 12)
    return unit(
      cubic(a, output.slice(k * 12 + 8, k * 12 + 12), b, output.slice(k * 12 + 12, k * 12 + 16), u, td),
    );
  const cosine = a.reduce((sum, x, i) => sum + x * b[i], 0);
  const sign = cosine < 0 ? -1 : 1;
  // The text's arccos of the dot product loses small angles; the same angle by its half chord does not.
  const half = Math.hypot(...a.map((x, i) => x - sign * b[i])) / 2;
  const angle = 2 * Math.asin(Math.min(1, half));
  if (angle < 1e-9) return unit(a.map((x, i) => x * (1 - u) + sign * b[i] * u));
  return unit(
    a.map((x, i) => (Math.sin(angle * (1 - u)) * x + sign * Math.sin(angle * u) * b[i]) / Math.sin(angle)),
  );
}

/** Angle between two orientations, degrees. */
export function degreesBetween(a: readonly number[], b: readonly number[]): number {
  const sign = a.reduce((sum, x, i) => sum + x * b[i], 0) < 0 ? -1 : 1;
  const chord = Math.hypot(...a.map((x, i) => x - sign * b[i]));
  const sum = Math.hypot(...a.map((x, i) => x + sign * b[i]));
  return (4 * Math.atan2(chord, sum) * 180) / Math.PI;
}

function cubic(
  v0: number[],
  out0: readonly number[],
  v1: number[],
  in1: readonly number[],
  t: number,
  td: number,
): number[] {
  const t2 = t * t;
  const t3 = t2 * t;
  return v0.map(
    (_, i) =>
      (2 * t3 - 3 * t2 + 1) * v0[i] +
      td * (t3 - 2 * t2 + t) * out0[i] +
      (-2 * t3 + 3 * t2) * v1[i] +
      td * (t3 - t2) * in1[i],
  );
}

function unit(q: readonly number[]): number[] {
  const length = Math.hypot(...q);
  return q.map((x) => x / length);
}

function numbersOf(json: Json, bin: DataView, index: number): number[] {
  const accessor = json.accessors[index];
  const view = json.bufferViews[accessor.bufferView];
  const width = accessor.type === 'VEC4' ? 4 : 1;
  const size = { 5120: 1, 5122: 2, 5126: 4 }[accessor.componentType] ?? 0;
  const stride = view.byteStride ?? width * size;
  const start = (view.byteOffset ?? 0) + (accessor.byteOffset ?? 0);
  return Array.from({ length: accessor.count * width }, (_, i) => {
    const at = start + Math.floor(i / width) * stride + (i % width) * size;
    if (size === 4) return bin.getFloat32(at, true);
    return size === 2 ? Math.max(bin.getInt16(at, true) / 32767, -1) : Math.max(bin.getInt8(at) / 127, -1);
  });
}
