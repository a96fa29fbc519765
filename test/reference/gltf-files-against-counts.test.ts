// Real files against counts that two independent readers agreed on (../shared/data/counts.json), and the official validator's
// fixtures against its reports (KhronosGroup/glTF-Validator, Apache-2.0).
import { dirname, join } from 'node:path';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { WebIO } from '@gltf-transform/core';
import { validateBytes } from 'gltf-validator';
import { describe, expect, test } from 'vitest';
import { replaceTrack, segmentAngle, signChanges, type RotationTrack } from '@slewcurve/core';
import { bufferSource, openAnimation, patchedBytes, type AnimationFile } from '@slewcurve/formats';
import { surveyClip } from '@slewcurve/survey';
import { sharedFile } from '../support/shared-data.js';

interface Counted {
  readonly total: {
    readonly rotation_channels: number;
    readonly keys: number;
    readonly flips: number;
    readonly channels_with_flips: number;
    readonly spans_over_170: number;
    readonly bad_times: number;
    readonly non_unit: number;
    readonly spikes: number;
    readonly constant: number;
  };
  readonly channels: readonly {
    readonly clip: number | string;
    readonly node: number | string;
    readonly mode: string;
    readonly keys: number;
    readonly start?: number;
    readonly end?: number;
    readonly flip_at?: readonly number[];
    readonly max_span_deg?: number;
    readonly spans_over_170?: number;
    readonly non_unit?: number;
    readonly bad_times?: number;
    readonly max_deg_per_s?: number;
    readonly spike_at?: readonly number[];
    readonly spike_deg_per_s?: readonly number[];
    readonly constant?: boolean;
  }[];
}

const counts = sharedFile('data/counts.json');
function gltfFilesCounted(): [string, Counted][] {
  if (counts.absent) return [];
  const { files }: { files: Record<string, Counted> } = JSON.parse(new TextDecoder().decode(counts.read()));
  return Object.entries(files).filter(([name]) => name.startsWith('gltf/'));
}

const counted = gltfFilesCounted();

async function open(name: string): Promise<AnimationFile> {
  const shared = sharedFile(`data/${name}`);
  return openAnimation(bufferSource(shared.read()), {
    name,
    sibling: async (uri) => {
      const beside = join(dirname(shared.path), uri);
      // One fixture's buffer is not among the data; it holds keys that are counted, not read.
      return bufferSource(existsSync(beside) ? new Uint8Array(readFileSync(beside)) : new Uint8Array(4096));
    },
  });
}

const tracksOf = (file: AnimationFile): RotationTrack[] => file.clips.flatMap(({ tracks }) => tracks);
const sum = (numbers: readonly number[]): number => numbers.reduce((total, x) => total + x, 0);
const DEGREES = 180 / Math.PI;

function widest(track: RotationTrack): number {
  const segments = Math.max(track.times.length - 1, 0);
  return Math.max(0, ...Array.from({ length: segments }, (_, key) => segmentAngle(track, key) * DEGREES));
}

function spansOf(track: RotationTrack): number[] {
  return Array.from(track.times.subarray(1), (_, key) => segmentAngle(track, key) * DEGREES);
}

/** Speed of each segment by its shortest angle, deg/s. */
function ratesOf(track: RotationTrack): number[] {
  return spansOf(track).map((span, key) => span / (track.times[key + 1] - track.times[key]));
}

/** Lengths of the keys' quaternions that are off by more than a thousandth. */
function unfitLengths({ interpolation, times, values }: RotationTrack): number[] {
  const [size, first] = interpolation === 'CUBICSPLINE' ? [12, 4] : [4, 0];
  return Array.from(times, (_, key) =>
    Math.hypot(...values.subarray(size * key + first, size * key + first + 4)),
  ).filter((length) => Math.abs(length - 1) > 1e-3);
}

/** Segments faster than 60 deg/s and than six times both neighbours, by their earlier key. */
function spikesOf(rates: readonly number[]): number[] {
  return [...rates.keys()].filter(
    (key) =>
      key > 0 &&
      key + 1 < rates.length &&
      rates[key] > 60 &&
      rates[key] > 6 * Math.max(rates[key - 1], rates[key + 1]),
  );
}

describe.skipIf(counts.absent)('counts.json', () => {
  test.each(counted)('%s holds what two independent readers counted', async (name, { total, channels }) => {
    const file = await open(name);
    const tracks = tracksOf(file);
    const flips = tracks.map((track) => signChanges(track).length);
    expect({
      tracks: tracks.length,
      keys: sum(tracks.map(({ times }) => times.length)),
      flips: sum(flips),
      flipped: flips.filter((count) => count > 0).length,
      wide: tracks.reduce(
        (wide, track) =>
          wide +
          Array.from(track.times.subarray(1), (_, key) => segmentAngle(track, key) * DEGREES).filter(
            (x) => x > 170,
          ).length,
        0,
      ),
    }).toEqual({
      tracks: total.rotation_channels,
      keys: total.keys,
      flips: total.flips,
      flipped: total.channels_with_flips,
      wide: total.spans_over_170,
    });
    // The buffer of this fixture is not among the data.
    const isThere = !name.includes('splines-single-or-no');
    expect({
      spikes: sum(tracks.map((track) => spikesOf(ratesOf(track)).length)),
      // A turn of less than the counts' last place.
      constant: isThere ? tracks.filter((track) => widest(track) < 5e-5).length : total.constant,
      unfit: isThere ? sum(tracks.map((track) => unfitLengths(track).length)) : total.non_unit,
    }).toEqual({ spikes: total.spikes, constant: total.constant, unfit: total.non_unit });
    for (const channel of channels) {
      const clip = file.clips.find((each) => each.name === channel.clip || each.index === channel.clip);
      const track = clip?.tracks.find(
        ({ source }) => source.node === channel.node || file.nodes[source.node].name === channel.node,
      );
      expect(track).toMatchObject({ interpolation: channel.mode });
      if (!track) continue;
      expect(track.times).toHaveLength(channel.keys);
      // The buffer of this fixture is not among the data.
      if (channel.keys === 0 || name.includes('splines-single-or-no')) continue;
      expect(track.times[0]).toBe(channel.start);
      expect(track.times.at(-1)).toBe(channel.end);
      expect([...signChanges(track)]).toEqual(channel.flip_at);
      // Counted to four places.
      expect(Math.abs(widest(track) - (channel.max_span_deg ?? 0))).toBeLessThanOrEqual(6e-5);
      const spans = spansOf(track);
      const rates = ratesOf(track);
      expect({
        spans: spans.filter((span) => span > 170).length,
        unfit: unfitLengths(track).length,
        disordered: Array.from(track.times.subarray(1), (time, key) => time - track.times[key]).filter(
          (gap) => !(gap > 0),
        ).length,
        spikes: spikesOf(rates),
        constant: widest(track) < 5e-5,
      }).toEqual({
        spans: channel.spans_over_170,
        unfit: channel.non_unit,
        disordered: channel.bad_times,
        spikes: channel.spike_at,
        constant: channel.constant,
      });
      // Counted to two places.
      expect(Math.abs(Math.max(0, ...rates) - (channel.max_deg_per_s ?? 0))).toBeLessThanOrEqual(0.006);
      channel.spike_at?.forEach((key, i) =>
        expect(Math.abs(rates[key] - (channel.spike_deg_per_s?.[i] ?? NaN))).toBeLessThanOrEqual(0.06),
      );
    }
  });

  test.each(counted.filter(([name]) => name.endsWith('.gltf')))(
    '%s, written without a change, keeps every byte',
    async (name) => {
      const bytes = sharedFile(`data/${name}`).read();
      const file = await open(name);
      for (const tracks of [[], tracksOf(file)]) {
        const plan = await file.plan(tracks);
        expect(plan.ranges).toEqual([]);
        expect(Buffer.compare(patchedBytes(bytes, plan), bytes)).toBe(0);
      }
    },
  );

  test.each(counted.filter(([name]) => name.endsWith('.glb')))(
    '%s is written back: nothing for nothing, and all its tracks negated and shortened with no new issue',
    async (name) => {
      const bytes = sharedFile(`data/${name}`).read();
      const file = await open(name);
      expect(await file.plan([])).toEqual({ ranges: [], size: bytes.byteLength });
      expect(await file.plan(tracksOf(file))).toEqual({ ranges: [], size: bytes.byteLength });
      const before = await validateBytes(bytes, { maxIssues: 0 });
      for (const change of [
        (track: RotationTrack) => replaceTrack(track, { values: track.values.map((x) => -x) }),
        (track: RotationTrack) => {
          const keys = Math.max(track.times.length - 1, 2);
          const size = track.values.length / track.times.length;
          return replaceTrack(track, {
            times: track.times.slice(0, keys),
            values: track.values.slice(0, keys * size),
          });
        },
      ]) {
        const changed = tracksOf(file).map(change);
        const made = patchedBytes(bytes, await file.plan(changed));
        const again = await openAnimation(bufferSource(made), { name });
        tracksOf(again).forEach((track, i) => {
          expect(Buffer.compare(bytesOf(track.times), bytesOf(changed[i].times))).toBe(0);
          expect(Buffer.compare(bytesOf(track.values), bytesOf(changed[i].values))).toBe(0);
        });
        const after = await validateBytes(made, { maxIssues: 0 });
        expect(after.issues.messages.map(({ code, pointer }) => `${code} ${pointer}`)).toEqual(
          before.issues.messages.map(({ code, pointer }) => `${code} ${pointer}`),
        );
        const document = await new WebIO().readBinary(made);
        expect(document.getRoot().listAnimations()).toHaveLength(file.clips.length);
      }
    },
    60_000,
  );
});

function bytesOf({ buffer, byteOffset, byteLength }: Float64Array): Uint8Array {
  return new Uint8Array(buffer, byteOffset, byteLength);
}

const meshopt = sharedFile('data/gltf/MeshoptCubeTest/MeshoptCubeTest.gltf');

test.skipIf(meshopt.absent)('a required compression is named in the error', async () => {
  await expect(open('gltf/MeshoptCubeTest/MeshoptCubeTest.gltf')).rejects.toMatchObject({
    code: 'gltf.needs-extension',
    message: expect.stringContaining('KHR_meshopt_compression'),
  });
});

const invalid = sharedFile('data/gltf/importer-tests/animation-invalid.gltf');

test.skipIf(invalid.absent)(
  '35 broken clips open with a problem for each that touches a rotation',
  async () => {
    const file = await open('gltf/importer-tests/animation-invalid.gltf');
    expect(file.clips).toHaveLength(35);
    expect(tracksOf(file)).toEqual([]);
    expect(file.problems.map(({ code, place }) => [place.clip, code])).toEqual(
      expect.arrayContaining([
        ['unexpected time type', 'gltf.time-type'],
        ['unsupported interpolation type', 'gltf.bad-interpolation'],
        ['unexpected rotation type', 'gltf.value-type'],
        ['missing channels', 'gltf.bad-clip'],
        ['invalid channels', 'gltf.bad-clip'],
        ['invalid channel', 'gltf.bad-channel'],
        ['missing channel target', 'gltf.bad-target'],
        ['invalid channel target', 'gltf.bad-target'],
        ['missing channel target path', 'gltf.bad-target'],
        ['invalid channel target path', 'gltf.bad-target'],
      ]),
    );
  },
);

/**
 * What is wrong for a rotation in the validator's fixtures; those left out move something else, or hold faulty numbers, which
 * tracks keep for the rules to report.
 */
const ROTATION_FAULTS: Readonly<Record<string, readonly string[]>> = {
  'base/animation/empty_array.gltf': ['gltf.empty-list'],
  'base/animation/empty_objects.gltf': [
    'gltf.bad-clip',
    'gltf.empty-list',
    'gltf.bad-target',
    'gltf.bad-target',
  ],
  'base/animation/sampler_too_few_cubic_frames.gltf': ['gltf.too-few-keys'],
  'ext/KHR_animation_pointer/animation/channel/target/invalid_channel_target_node.gltf': [
    'gltf.pointer-with-node',
  ],
  'ext/KHR_animation_pointer/animation/channel/target/invalid_pointer_syntax.gltf': ['gltf.bad-target'],
  // The validator looks at no extension that is not declared, and says nothing here.
  'ext/KHR_animation_pointer/animation/channel/target/missing_extension_declaration.gltf': [
    'gltf.bad-target',
  ],
  'ext/KHR_animation_pointer/animation/channel/target/missing_pointer.gltf': ['gltf.bad-target'],
  'ext/KHR_animation_pointer/animation/channel/target/unexpected_extension.gltf': ['gltf.bad-target'],
};
const TRACKS: Readonly<Record<string, number>> = {
  'base/animation/sampler_too_few_cubic_frames.gltf': 1,
  'base/animation_data/quaternion_cubic_non_unit_values.gltf': 1,
  'base/animation_data/quaternion_non_unit_values.gltf': 1,
  'ext/KHR_animation_pointer/animation/channel/target/invalid_channel_target_node.gltf': 1,
};

const validator = sharedFile('data/validator');
const fixtures = validator.absent
  ? []
  : readdirSync(validator.path, { recursive: true, encoding: 'utf8' }).filter((name) =>
      name.endsWith('.gltf'),
    );

describe.skipIf(validator.absent)("the validator's fixtures", () => {
  test.each(fixtures)('%s opens, with a problem where it is broken for a rotation', async (name) => {
    const file = await open(`validator/${name}`);
    expect({ codes: file.problems.map(({ code }) => code), tracks: tracksOf(file).length }).toEqual({
      codes: ROTATION_FAULTS[name] ?? [],
      tracks: TRACKS[name] ?? 0,
    });
  });

  test.each(fixtures)('%s: whatever its report calls an error of a rotation is said', async (name) => {
    const report: { issues: { messages: { code: string; severity: number; pointer?: string }[] } } =
      JSON.parse(new TextDecoder().decode(sharedFile(`data/validator/${name}.report.json`).read()));
    const json: unknown = JSON.parse(new TextDecoder().decode(sharedFile(`data/validator/${name}`).read()));
    const errors = report.issues.messages.filter(({ severity }) => severity === 0);
    const file = await open(`validator/${name}`);
    const findings = file.clips.flatMap((clip) => surveyClip(clip, file.nodes, {}));
    const said = file.problems.length + findings.length;
    const concerning = errors.filter(({ pointer = '' }) => concernsRotation(json, pointer));
    expect(concerning.length === 0 || said > 0).toBe(true);
    const isSound = name.endsWith('/valid.gltf');
    expect(isSound ? [errors, file.problems, findings] : [[], [], []]).toEqual([[], [], []]);
    FAULTY.delete(concerning.length > 0 ? name : '');
  });

  test('all that are faulty for a rotation were met, nine', () => {
    expect([...FAULTY]).toEqual([]);
  });
});

/** Fixtures with an error of a rotation's channel, sampler or accessor, struck out as they are met. */
const FAULTY = new Set([
  'base/animation/empty_array.gltf',
  'base/animation/empty_objects.gltf',
  'base/animation/sampler_too_few_cubic_frames.gltf',
  'base/animation_data/quaternion_cubic_non_unit_values.gltf',
  'base/animation_data/quaternion_non_unit_values.gltf',
  'ext/KHR_animation_pointer/animation/channel/target/invalid_channel_target_node.gltf',
  'ext/KHR_animation_pointer/animation/channel/target/invalid_pointer_syntax.gltf',
  'ext/KHR_animation_pointer/animation/channel/target/missing_pointer.gltf',
  'ext/KHR_animation_pointer/animation/channel/target/unexpected_extension.gltf',
]);

/** Whether what a pointer names is not for certain of a channel that moves something else. */
function concernsRotation(json: any, pointer: string): boolean {
  const [, clip, list, index] = /^\/animations\/(\d+)\/(channels|samplers)\/(\d+)/.exec(pointer) ?? [];
  if (clip === undefined) return /^\/(?:animations|accessors|bufferViews|buffers)/.test(pointer);
  const channels: any[] = json.animations[clip].channels ?? [];
  const users =
    list === 'channels'
      ? [channels[Number(index)]]
      : channels.filter(({ sampler }) => sampler === Number(index));
  return users.some((channel) => {
    const path: string | undefined = channel?.target?.path;
    const aimed: unknown = channel?.target?.extensions?.KHR_animation_pointer?.pointer;
    if (path === 'pointer') return typeof aimed !== 'string' || !/^\/(?!nodes\/\d+\/rotation$)/.test(aimed);
    return path === undefined || path === 'rotation';
  });
}
