// A sound asset spoilt in one place after another, before the official validator (gltf-validator 2.0.0-dev.3.10, Apache-2.0): whatever it
// calls an error of a rotation's channel, sampler, accessors, views or buffer has a problem, a finding or an error of ours.
import * as fc from 'fast-check';
import { validateBytes, type Message } from 'gltf-validator';
import { describe, expect, test } from 'vitest';
import { SlewcurveError } from '@slewcurve/core';
import { bufferSource, openAnimation } from '@slewcurve/formats';
import { surveyClip } from '@slewcurve/survey';
import { aboutZ, glb, Packer, type GltfJson } from '../support/gltf-bytes.js';
import { seededRandom } from '../support/seeded-random.js';

/** `npm run long`: every place with every odd value. */
const LONG = fc.readConfigureGlobal()?.numRuns !== undefined;

const DEGREES = [0, 3, 6, 9, 12];
const stillEnds = (from: number, to: number): number[] =>
  [aboutZ(from), aboutZ(to)].flatMap((value) => [0, 0, 0, 0, ...value, 0, 0, 0, 0]);

function soundAsset(): { readonly asset: GltfJson; readonly data: Uint8Array } {
  const packer = new Packer();
  const input = packer.add(
    'SCALAR',
    DEGREES.map((_, key) => key / 24),
  );
  const plain = packer.add('VEC4', DEGREES.flatMap(aboutZ));
  const short = packer.add('VEC4', DEGREES.flatMap(aboutZ), 'short');
  const ends = packer.add('SCALAR', [0, 4 / 24]);
  const cubic = packer.add('VEC4', stillEnds(0, 9));
  const indices = packer.view(Uint8Array.of(1, 2));
  const values = packer.view(new Uint8Array(Float32Array.from([3, 6].flatMap(aboutZ)).buffer));
  const [, , top, bottom] = aboutZ(12).map(Math.fround);
  const sparse = packer.add('VEC4', DEGREES.flatMap(aboutZ), 'float', {
    min: [0, 0, 0, bottom],
    max: [0, 0, top, 1],
    sparse: {
      count: 2,
      indices: { bufferView: indices, byteOffset: 0, componentType: 5121 },
      values: { bufferView: values, byteOffset: 0 },
    },
  });
  Object.assign(packer.accessors[plain], { normalized: false, byteOffset: 0 });
  const json = {
    ...packer.json,
    extensionsUsed: ['KHR_animation_pointer'],
    scene: 0,
    scenes: [{ nodes: [0] }],
    nodes: [{ name: 'Mast', children: [1, 2, 3] }, { name: 'Boom' }, { name: 'Jib' }, { name: 'Hook' }],
    animations: [
      {
        name: 'Turn',
        channels: [
          ...[0, 1, 2].map((node) => ({ sampler: node, target: { node, path: 'rotation' } })),
          {
            sampler: 3,
            target: {
              path: 'pointer',
              extensions: { KHR_animation_pointer: { pointer: '/nodes/3/rotation' } },
            },
          },
        ],
        samplers: [
          { input, output: plain },
          { input, output: short, interpolation: 'STEP' },
          { input: ends, output: cubic, interpolation: 'CUBICSPLINE' },
          { input, output: sparse },
        ],
      },
    ],
  };
  return { asset: json, data: packer.data };
}

const { asset, data } = soundAsset();

/** Codes of everything that we say: problems, rules, or the error. */
async function ours(bytes: Uint8Array): Promise<string[]> {
  try {
    const file = await openAnimation(bufferSource(bytes), { name: 'mast.glb' });
    const found = file.clips.flatMap((clip) => surveyClip(clip, file.nodes).map(({ rule }) => rule));
    return [...file.problems.map(({ code }) => code), ...found];
  } catch (error) {
    if (error instanceof SlewcurveError) return [error.code];
    throw error;
  }
}

async function theirs(bytes: Uint8Array): Promise<readonly Message[]> {
  try {
    const { issues } = await validateBytes(bytes, { maxIssues: 0 });
    return issues.messages.filter(({ severity }) => severity === 0);
  } catch {
    // Some broken files break the validator itself.
    return [];
  }
}

/** What must answer a message; by code, where one alone will do. A schema's codes are answered by whatever we say. */
const ANSWERS: Readonly<Record<string, readonly string[]>> = {
  ACCESSOR_ANIMATION_INPUT_NEGATIVE: ['gltf.negative-time'],
  ACCESSOR_ANIMATION_INPUT_NON_INCREASING: ['file.time-order', 'file.not-finite'],
  ACCESSOR_ANIMATION_SAMPLER_OUTPUT_NON_NORMALIZED_QUATERNION: ['file.not-normalised', 'file.not-finite'],
  ACCESSOR_INVALID_FLOAT: ['file.not-finite'],
  ACCESSOR_MIN_MISMATCH: ['gltf.wrong-bounds', 'file.not-finite'],
  ACCESSOR_MAX_MISMATCH: ['gltf.wrong-bounds', 'file.not-finite'],
  ACCESSOR_ELEMENT_OUT_OF_MIN_BOUND: ['gltf.wrong-bounds', 'file.not-finite'],
  ACCESSOR_ELEMENT_OUT_OF_MAX_BOUND: ['gltf.wrong-bounds', 'file.not-finite'],
  ACCESSOR_SPARSE_INDICES_NON_INCREASING: ['gltf.sparse-order', 'gltf.bad-sparse'],
  ACCESSOR_SPARSE_INDEX_OOB: ['gltf.bad-sparse'],
  ACCESSOR_NORMALIZED_INVALID: ['gltf.normalised-float', 'gltf.time-type', 'gltf.value-type'],
  ANIMATION_DUPLICATE_TARGETS: ['gltf.doubled-target'],
  ANIMATION_CHANNEL_TARGET_NODE_MATRIX: ['gltf.matrix-target'],
  ANIMATION_SAMPLER_ACCESSOR_WITH_BYTESTRIDE: ['gltf.strided', 'gltf.bad-view'],
  ANIMATION_SAMPLER_INPUT_ACCESSOR_INVALID_FORMAT: ['gltf.time-type', 'gltf.normalised-float'],
  ANIMATION_SAMPLER_INPUT_ACCESSOR_WITHOUT_BOUNDS: ['gltf.no-bounds', 'gltf.bad-bounds', 'gltf.time-type'],
  ANIMATION_SAMPLER_INPUT_ACCESSOR_TOO_FEW_ELEMENTS: ['gltf.too-few-keys', 'gltf.count-mismatch'],
  ANIMATION_SAMPLER_OUTPUT_ACCESSOR_INVALID_FORMAT: ['gltf.value-type', 'gltf.normalised-float'],
  ANIMATION_SAMPLER_OUTPUT_ACCESSOR_INVALID_COUNT: ['gltf.count-mismatch', 'gltf.more-than-held'],
  KHR_ANIMATION_POINTER_ANIMATION_CHANNEL_TARGET_NODE: ['gltf.pointer-with-node'],
};

/** Messages of what a rotation is read from. A channel that is made to move something else is no rotation's. */
function concernsRotation({ pointer = '' }: Message, json: GltfJson): boolean {
  if (/^\/(?:animations|accessors|bufferViews|buffers)$/.test(pointer)) return true;
  const channel = /^\/animations\/0\/channels\/(\d)\//.exec(pointer)?.[1];
  if (channel !== undefined) return movesRotation(json, Number(channel));
  return /^\/(?:animations\/0\/(?!name)|accessors|bufferViews|buffers)/.test(pointer);
}

function movesRotation(json: GltfJson, channel: number): boolean {
  const { animations }: any = json;
  const text = JSON.stringify(animations?.[0]?.channels?.[channel]?.target ?? null);
  return text.includes('"rotation"') || text.includes('/rotation"');
}

async function unanswered(bytes: Uint8Array, json: GltfJson, errors: readonly Message[]): Promise<string[]> {
  const messages = errors.filter((message) => concernsRotation(message, json));
  if (messages.length === 0) return [];
  const said = await ours(bytes);
  // What stops the reading of a channel or a file answers all that is wrong with it.
  const stopped = said.some((code) => HIDING.test(code));
  return messages.flatMap(({ code, pointer }) => {
    const answers = ANSWERS[code];
    const isAnswered = stopped || (answers ? answers.some((one) => said.includes(one)) : said.length > 0);
    return isAnswered ? [] : [`${code} ${pointer ?? ''}`];
  });
}

const HIDING =
  /^gltf\.(?:no-|bad-|count-mismatch|value-type|time-type|view-out|accessor-out|more-than|buffer-short|not-json|version|needs)(?!bounds)/;

/** A member or an element of JSON, and what holds it. */
interface Place {
  readonly pointer: string;
  readonly holder: Record<string, unknown>;
  readonly key: string;
}

function* placesOf(holder: any, pointer = ''): Generator<Place> {
  if (typeof holder !== 'object' || holder === null) return;
  for (const key of Object.keys(holder)) {
    yield { pointer: `${pointer}/${key}`, holder, key };
    yield* placesOf(holder[key], `${pointer}/${key}`);
  }
}

const pointers = [...placesOf(asset)].map(({ pointer }) => pointer);
const ODD = [undefined, null, -1, 0, 1, 2, 0.5, 1e9, 5121, 5126, 'x', 'STEP', {}, [], [0], true];

function spoilt(pointer: string, odd: unknown): GltfJson {
  const copy = structuredClone(asset);
  const place = [...placesOf(copy)].find((each) => each.pointer === pointer);
  if (!place) throw new Error(pointer);
  if (odd === undefined) delete place.holder[place.key];
  else place.holder[place.key] = odd;
  return copy;
}

/** Members that the sound asset does not have. */
const ADDED: readonly (readonly [string, string, unknown])[] = [
  ['/bufferViews/1', 'byteStride', 16],
  ['/bufferViews/0', 'byteStride', 4],
  ['/bufferViews/5', 'byteStride', 4],
  ['/accessors/0', 'normalized', true],
  ['/accessors/2', 'normalized', false],
  ['/accessors/1', 'byteOffset', 2],
  ['/nodes/0', 'matrix', [1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1]],
  ['/animations/0/channels/3/target', 'node', 3],
  ['/animations/0/channels/1/target', 'node', 0],
  ['/accessors/5/sparse', 'count', 0],
  ['', 'meshes', [{ primitives: [{ attributes: { COLOR_0: 1 } }] }]],
];

describe('a sound asset', () => {
  test('has nothing to be said of it, by either', async () => {
    const bytes = glb(asset, data);
    expect([await theirs(bytes), await ours(bytes)]).toEqual([[], []]);
  });

  test.each(ADDED)('with %s/%s = %j', async (owner, name, value) => {
    const copy = structuredClone(asset);
    const place = [...placesOf({ '': copy })].find(({ pointer }) => pointer === `/${owner}`);
    const object: any = place?.holder[place.key];
    object[name] = value;
    const bytes = glb(copy, data);
    const errors = await theirs(bytes);
    expect(errors.length).toBeGreaterThan(0);
    expect(await unanswered(bytes, copy, errors)).toEqual([]);
    expect((await ours(bytes)).length).toBeGreaterThan(0);
  });

  const floats = [
    ['a negative time', 0, -1],
    ['a time that is none', 4, Number.NaN],
    ['two equal times', 8, 1 / 24],
    ['times that fall', 12, 0],
    ['a quaternion of length 0.5', 20 + 12, 0.5],
    ['a quaternion of no number', 20 + 12, Number.NaN],
    ['a tangent without end', 148, Infinity],
  ] as const;
  test.each(floats)('with %s', async (_, at, value) => {
    const bytes = data.slice();
    new DataView(bytes.buffer).setFloat32(at, value, true);
    const made = glb(asset, bytes);
    const errors = await theirs(made);
    expect(errors.length).toBeGreaterThan(0);
    expect(await unanswered(made, asset, errors)).toEqual([]);
  });

  const all = pointers.flatMap((pointer) => ODD.map((odd) => [pointer, odd] as const));
  const random = seededRandom(6);
  const tried = LONG ? all : all.filter(() => random() < 120 / all.length);
  test(`with any one value made another: ${tried.length} of ${all.length} ways (seed 6)`, async () => {
    const missed: string[] = [];
    let wrong = 0;
    for (const [pointer, odd] of tried) {
      const copy = spoilt(pointer, odd);
      const bytes = glb(copy, data);
      const errors = await theirs(bytes);
      if (errors.length > 0) wrong++;
      const left = await unanswered(bytes, copy, errors);
      if (left.length > 0) missed.push(`${pointer} = ${JSON.stringify(odd)}: ${left.join(', ')}`);
    }
    expect(missed).toEqual([]);
    expect(wrong).toBeGreaterThan(tried.length / 3);
  });
});
