import { createHash } from 'node:crypto';
import { kestrelPoint, kestrelPointRules } from '@slewcurve/job';
import { bufferSource, openAnimation } from '@slewcurve/formats';
import { validateBytes } from 'gltf-validator';
import { describe, expect, test } from 'vitest';

function fits(pattern: string, text: string): boolean {
  return new RegExp(`^${pattern.replaceAll('*', '.*')}$`).test(text);
}

const bytes = kestrelPoint();
const file = await openAnimation(bufferSource(bytes), { name: 'kestrel-point.glb' });

const CLIPS = [
  ['lens-thirds', 'lens', 10, 30],
  ['lens-halves', 'lens', 7, 30],
  ['lens-doubled-end', 'lens', 301, 30],
  ['crane-head', 'crane-head', 2250, 44.98],
  ['scope-pass', 'scope', 1500, 59.96],
  ['quay-flight', 'quay-camera', 11, 24],
  ['beetle-hip', 'left-fore-hip', 37, 1.2],
  ['beetle-knee', 'left-fore-knee', 37, 1.2],
  ['beetle-ankle', 'left-fore-ankle', 37, 1.2],
  ['vane-gusts', 'weather-vane', 1200, 19.983],
  ['vane-coarse', 'weather-vane', 1200, 19.983],
  ['vane-creep', 'weather-vane', 1200, 19.983],
] as const;

describe('the demo scene', () => {
  test('is valid binary glTF: the Khronos validator has no error and no warning', async () => {
    const { issues } = await validateBytes(bytes);
    expect(issues.messages.filter(({ severity }) => severity < 2)).toEqual([]);
    expect([issues.numErrors, issues.numWarnings]).toEqual([0, 0]);
  });

  test('is the same at every call', () => {
    const again = kestrelPoint();
    expect(again.buffer).not.toBe(bytes.buffer);
    expect(Buffer.compare(again, bytes)).toBe(0);
  });

  // Sines differ between machines by a unit in the 53rd bit at most; float32 storage keeps 24, so about one machine in ten thousand
  // would see another sum.
  test('has the bytes that everybody else sees', () => {
    expect(createHash('sha256').update(bytes).digest('hex')).toMatchInlineSnapshot(
      `"0ae69970bb6533c9d76f0b4b77112cf30e86e92120f0b34e8d4c6b81fc43d512"`,
    );
  });

  test('opens without a problem, as twelve clips of one rotation track each', () => {
    expect(file.problems).toEqual([]);
    expect(
      file.clips.map(({ name, end, tracks: [track] }) => [
        name,
        track.id.split('/').at(-1),
        track.times.length,
        // Float32 seconds: half a thousandth is ample.
        Math.round(end * 1000) / 1000,
      ]),
    ).toEqual(CLIPS);
    expect(file.clips.map(({ tracks }) => tracks.length)).toEqual(CLIPS.map(() => 1));
  });

  test('stores float32 numbers, and one clip in normalised bytes', () => {
    const components = file.clips.map(({ name, tracks: [track] }) => [name, track.storage.component]);
    expect(components).toEqual(CLIPS.map(([clip]) => [clip, clip === 'vane-coarse' ? 'int8' : 'float32']));
  });

  test('has cameras on the crane and the quay, and a beetle of eighteen joints', () => {
    const cameras = file.nodes.filter(({ camera }) => camera !== undefined);
    expect(cameras.map(({ name }) => name)).toEqual(['crane-head', 'quay-camera']);
    expect(file.nodes.filter(({ joint }) => joint)).toHaveLength(18);
    expect(new Set(file.nodes.map(({ name }) => name)).size).toBe(file.nodes.length);
  });

  test('has house rules whose every pattern means something in it', () => {
    const paths = file.nodes.map(({ path }) => path);
    const { roles, loops, exceptions, declared } = kestrelPointRules;
    const clips = [
      ...loops,
      ...exceptions.flatMap(({ where }) => where.clip ?? []),
      ...[declared.holds, declared.whips, declared.spins].flatMap((list) => list.map(({ clip }) => clip)),
    ];
    const tracks = [declared.holds, declared.whips, declared.spins].flatMap((list) =>
      list.map(({ track }) => track),
    );
    for (const pattern of clips) expect(CLIPS.some(([clip]) => fits(pattern, clip))).toBe(true);
    for (const pattern of [...Object.keys(roles), ...tracks])
      expect(paths.some((path) => fits(pattern, path))).toBe(true);
  });
});
