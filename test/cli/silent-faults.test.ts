// Faults that play visibly and that the official validator (gltf-validator 2.0.0-dev.3.10) has nothing to say of.
import { writeFileSync } from 'node:fs';
import { validateBytes } from 'gltf-validator';
import { describe, expect, test } from 'vitest';
import { Packer, glb } from '../support/gltf-bytes.js';
import { commandFolder, reportOf } from '../support/run-command.js';
import { turned } from '../support/written-gltf.js';

const RADIANS = Math.PI / 180;

interface Fault {
  readonly times?: readonly number[];
  /** Degrees about y at every key, or a stored quaternion. */
  readonly keys: readonly (number | readonly number[])[];
  /** deg/s at every key: CUBICSPLINE. Default LINEAR. */
  readonly slopes?: readonly number[];
  /** Keys on the other side, tangents along. */
  readonly negated?: readonly number[];
  /** Leave the tangents beyond both ends in. */
  readonly ends?: boolean;
}

function value(key: number | readonly number[]): readonly number[] {
  if (typeof key !== 'number') return key;
  return [0, Math.sin((key * RADIANS) / 2), 0, Math.cos((key * RADIANS) / 2)];
}

function tangent(key: number | readonly number[], slope: number): readonly number[] {
  const [, sine, , cosine] = value(key);
  return [0, (cosine * slope * RADIANS) / 2, 0, (-sine * slope * RADIANS) / 2];
}

function fileOf({ keys, slopes, negated = [], ends, times = keys.map((_, k) => k / 30) }: Fault): Uint8Array {
  const packer = new Packer();
  const none = [0, 0, 0, 0];
  const last = keys.length - 1;
  const numbers = keys.flatMap((key, k) => {
    const sign = negated.includes(k) ? -1 : 1;
    const own = value(key);
    const slope = slopes === undefined ? none : tangent(key, slopes[k]);
    const cubic = [k === 0 && !ends ? none : slope, own, k === last && !ends ? none : slope].flat();
    return (slopes === undefined ? own : cubic).map((x) => sign * x);
  });
  const sampler = {
    input: packer.add('SCALAR', times),
    output: packer.add('VEC4', numbers),
    interpolation: slopes === undefined ? 'LINEAR' : 'CUBICSPLINE',
  };
  return glb(turned(packer, [sampler]), packer.data);
}

async function issuesOf(bytes: Uint8Array): Promise<string[]> {
  const { issues } = await validateBytes(bytes, { maxIssues: 0 });
  return issues.messages.map(({ code, pointer }) => `${code} ${pointer}`);
}

const KEYS = Array.from({ length: 24 }, (_, k) => k);
const SECONDS = [0, 1, 2, 3, 4, 5];
const STEADY = SECONDS.map((time) => 10 * time);
const SLOPES = SECONDS.map(() => 10);

type Case = readonly [what: string, fault: Fault, rule: string, level: string, flags?: readonly string[]];

const FAULTS: readonly Case[] = [
  ['half a turn', { keys: [0, 180], times: [0, 1] }, 'turn.half', 'error'],
  ['half a turn less 0.01° each way', { keys: [0, 179.99, -179.99], times: [0, 1, 2] }, 'turn.half', 'error'],
  ['+179.99° beside −179.99°', { keys: [179.99, -179.99], times: [0, 1] }, 'turn.sign-flip', 'note'],
  ['a change of sign under LINEAR', { keys: KEYS, negated: [7] }, 'turn.sign-flip', 'note'],
  [
    'a change of sign under CUBICSPLINE',
    { keys: STEADY, times: SECONDS, slopes: SLOPES, negated: [3, 4, 5] },
    'turn.sign-flip',
    'error',
  ],
  [
    'q beside −q under CUBICSPLINE',
    { keys: [20, 20, 20], times: [0, 1, 2], slopes: [0, 0, 0], negated: [1, 2] },
    'pace.cubic-collapse',
    'error',
  ],
  ['an open loop, declared', { keys: KEYS }, 'seam.loop-gap', 'warning', ['--loop', 'Clip 0']],
  ['90° for one frame', { keys: KEYS.map((k) => (k === 11 ? k + 90 : k)) }, 'jump.lone-key', 'warning'],
  [
    'tangents a hundred times as long',
    { keys: STEADY, times: SECONDS, slopes: SLOPES.map((slope) => 100 * slope) },
    'pace.tangent-scale',
    'warning',
  ],
  [
    'tangents beyond the ends',
    { keys: STEADY, times: SECONDS, slopes: SLOPES, ends: true },
    'pace.end-tangent',
    'note',
  ],
  [
    'two times 1e-6 s apart',
    { keys: [0, 10, 20, 30], times: [0, 0.2, 0.200_001, 0.4] },
    'file.time-order',
    'warning',
  ],
  ['all keys equal', { keys: KEYS.map(() => 30) }, 'file.idle', 'note'],
  [
    'a length of 1.0011',
    { keys: KEYS.map((k) => (k === 9 ? value(k).map((x) => 1.0011 * x) : k)) },
    'file.not-normalised',
    'warning',
  ],
];

describe('what the validator is silent on', () => {
  for (const [what, fault, rule, level, flags] of FAULTS)
    test(`${what} is named by check`, async () => {
      const { run, path } = await commandFolder();
      const bytes = fileOf(fault);
      writeFileSync(path('a.glb'), bytes);
      const ran = await run('check', 'a.glb', '--format', 'json', ...(flags ?? []));
      const found = reportOf(ran).files[0].findings.filter((finding) => finding.rule === rule);
      expect(found.map((finding) => finding.level)).toEqual([level]);
      // Node 0 carries nothing: the same hint for all of them, and for a clean file.
      expect(await issuesOf(bytes)).toEqual(await issuesOf(fileOf({ keys: KEYS })));
    });

  test('a steady turn is clean, and the validator’s one remark on it is of another kind', async () => {
    const { run, path } = await commandFolder();
    writeFileSync(path('a.glb'), fileOf({ keys: KEYS }));
    const ran = await run('check', 'a.glb', '--format', 'json');
    expect([ran.code, reportOf(ran).files[0].findings]).toEqual([0, []]);
    for (const issue of await issuesOf(fileOf({ keys: KEYS })))
      expect(issue).toMatch(/^(UNUSED|NODE_EMPTY|EMPTY)/);
  });
});
