// Every door through which strangers' bytes come in, before files that were changed at random: each ends in what it reads or in a coded
// error. `npm run long` goes through 200,000 of them and writes its counts to test/data/fuzz.json.
import { readFileSync, writeFileSync } from 'node:fs';
import * as fc from 'fast-check';
import { expect, test } from 'vitest';
import { readTime, replaceTrack, SlewcurveError } from '@slewcurve/core';
import {
  bufferSource,
  checkPatchPlan,
  openAnimation,
  parsePatchPlan,
  patchedBytes,
  patchPlanJson,
  type OpenOptions,
} from '@slewcurve/formats';
import {
  baselineJson,
  baselineOf,
  parseBaseline,
  parseStamps,
  stampsFor,
  stampsJson,
  surveyFile,
  withBaseline,
  withStamps,
} from '@slewcurve/job';
import { applySteps, parseJobCard, parseSentence, sayStep, type Step } from '@slewcurve/mend';
import { NO_HOUSE_RULES, parseHouseRules, surveyTrack } from '@slewcurve/survey';
import { BOOM } from '../support/bvh-text.js';
import { aboutZ, glb, gltf, Packer } from '../support/gltf-bytes.js';
import { measured } from '../support/measured.js';
import { mutatedBytes, mutatedJson } from '../support/mutation.js';
import { seededRandom } from '../support/seeded-random.js';
import { turningTrack } from '../support/turning-track.js';

/** `npm run long`. */
const LONG = fc.readConfigureGlobal()?.numRuns !== undefined;
const SEED = 3;
const FILES = LONG ? 200_000 : 5000;
const COUNTS = 'test/data/fuzz.json';

/** A parser with sound files of its kind, and what reads one and does with it what the program does. */
interface Door {
  readonly name: string;
  /** Files of a hundred. */
  readonly share: number;
  readonly sound: readonly (Uint8Array | string)[];
  /** JSON: changed as such, and now and then as bytes. */
  readonly json?: boolean;
  /** A changed file, where bytes made others at random are not what gets far. */
  mutate?(random: () => number): Uint8Array;
  /** @throws SlewcurveError where the file is refused */
  take(bytes: Uint8Array, text: () => string): void | Promise<void>;
}

const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text);

function crane(): { readonly asset: object; readonly data: Uint8Array } {
  const packer = new Packer();
  const input = packer.add('SCALAR', [0, 0.5, 1]);
  const output = packer.add('VEC4', [0, 90, 170].flatMap(aboutZ), 'short');
  const indices = packer.view(Uint8Array.of(1));
  const values = packer.view(new Uint8Array(Float32Array.from(aboutZ(90)).buffer));
  const sparse = packer.add('VEC4', [0, 0, 0].flatMap(aboutZ), 'float', {
    sparse: {
      count: 1,
      indices: { bufferView: indices, componentType: 5121 },
      values: { bufferView: values },
    },
  });
  const move = packer.add('VEC3', [0, 0, 0, 1, 0, 0, 2, 0, 0]);
  const asset = {
    ...packer.json,
    extensionsUsed: ['KHR_animation_pointer'],
    cameras: [{ type: 'perspective', perspective: { yfov: 0.7, aspectRatio: 1.5, znear: 0.1 } }],
    skins: [{ joints: [0, 1] }],
    nodes: [
      { name: 'Mast', children: [1], matrix: [1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1] },
      { name: 'Boom', rotation: [0, 0, 0, 1], camera: 0 },
    ],
    animations: [
      {
        name: 'Sweep',
        channels: [
          { sampler: 0, target: { node: 0, path: 'rotation' } },
          {
            sampler: 1,
            target: {
              path: 'pointer',
              extensions: { KHR_animation_pointer: { pointer: '/nodes/1/rotation' } },
            },
          },
          { sampler: 2, target: { node: 1, path: 'translation' } },
        ],
        samplers: [
          { input, output },
          { input, output: sparse, interpolation: 'STEP' },
          { input, output: move },
        ],
      },
    ],
  };
  return { asset, data: packer.data };
}

/** Opens, writes what did not change, changes, writes, and opens again. */
async function openAndWrite(bytes: Uint8Array, options: OpenOptions): Promise<void> {
  const file = await openAnimation(bufferSource(bytes), options);
  const tracks = file.clips.flatMap((clip) => clip.tracks);
  expect((await file.plan(tracks)).ranges).toEqual([]);
  const changed = tracks.map((track) => replaceTrack(track, { values: track.values.map((x) => -x) }));
  const [first] = tracks;
  const followers = first ? [{ clip: first.clip, turnsBack: false, newTime: (old: number) => 2 * old }] : [];
  const made = patchedBytes(bytes, await file.plan(changed, file.fixedTimes ? [] : followers));
  const again = await openAnimation(bufferSource(made), options);
  expect(again.clips.flatMap((clip) => clip.tracks)).toHaveLength(tracks.length);
}

function animation(name: string, share: number, sound: Door['sound'], options: OpenOptions): Door {
  return { name, share, sound, take: (bytes) => openAndWrite(bytes, options) };
}

const { asset, data } = crane();
const whole = glb({ ...asset }, data);
const uri = `data:application/octet-stream;base64,${Buffer.from(data).toString('base64')}`;
const buffers = [{ byteLength: data.byteLength, uri }];
const beside = [{ byteLength: data.byteLength, uri: 'crane.bin' }];

const walk = turningTrack((key) => (key === 9 ? 175 : key), 20);
const clip = { name: 'Wave', index: 0, tracks: [walk], start: 0, end: 19 / 30, loop: false, marks: [] };
const report = await surveyFile(
  'walk.glb',
  {
    format: 'glb',
    nodes: [],
    clips: [clip],
    fixedTimes: false,
    problems: [],
    plan: () => Promise.reject(new Error()),
  },
  { playbacks: ['as-written'], failAt: 'warning', allowWarnings: 0, houseRules: NO_HOUSE_RULES },
);

const STEPS: readonly Step[] = [
  { verb: 'lift out', clip: 'Wave', track: 'Arm', keys: [9] },
  {
    verb: 'bridge',
    clip: 'Wave',
    track: '*',
    keys: [9],
    steps: 4,
    keep: [0],
    span: [0, 0.6],
    shoulders: 0.1,
  },
  { verb: 're-seat', clip: '*', track: 'Arm', keys: [9], side: 'own', fade: 0.1 },
  { verb: 'choose side', clip: 'Wave', track: 'Arm', keys: [9], axis: [0, -1, 0] },
  { verb: 'cap', clip: 'Wave', track: 'Arm', rate: 200, with: 'track', store: 'move' },
  { verb: 'stretch', clip: 'Wave', track: 'Arm', span: [0, 0.5], seconds: 1, with: 'track', store: 'frames' },
  { verb: 'reverse', clip: 'Wave', track: 'Arm', with: 'track' },
];

const RULES = {
  roles: { 'Arm*': 'joint', '*/eye*': 'eye' },
  limits: { '*': { 'jump.lone-key': 2 }, joint: { 'jump.shelf': { size: 3 }, 'pace.elbow': 'off' } },
  levels: { 'jump.lone-key': 'error', 'turn.half': 'off' },
  exceptions: [
    {
      where: { file: 'walk*', clip: 'Wave', track: '*' },
      limits: { prop: { 'jump.shelf': 1 } },
      levels: {},
    },
  ],
  loops: ['Wa*'],
  declared: {
    cuts: [{ clip: 'Wave', track: 'Arm', time: 0.3 }],
    holds: [{ clip: 'Wave', track: 'Arm', span: [0, 0.2] }],
    whips: [{ clip: '*', track: '*', span: [0.1, 0.2] }],
    spins: [{ clip: 'Wave', track: 'Arm', rpm: 33 }],
    marks: [{ clip: 'Wave', time: 0.3, name: 'hit' }],
  },
  playback: ['as-written', 'chord'],
  leaveOut: ['old/*'],
};

const plan = {
  ranges: [
    { at: 4, length: 2, bytes: Uint8Array.of(1, 2, 3), what: 'a value' },
    { at: 60, length: 0, bytes: Uint8Array.of(9), what: 'a tail' },
  ],
  size: 62,
};
const words = { reason: 'meant', by: 'Ada', date: '2026-01-05' };

const DOORS: readonly Door[] = [
  {
    ...animation('GLB', 18, [whole], { name: 'x.glb' }),
    mutate(random) {
      const kind = random();
      if (kind < 0.2) return mutatedBytes(whole, random);
      if (kind < 0.6) return glb(mutatedJson(JSON.stringify(asset), random), data);
      const bytes = whole.slice();
      for (let n = Math.floor(random() * 4); n >= 0; n--)
        bytes[Math.floor(random() * bytes.length)] = Math.floor(random() * 256);
      return bytes;
    },
  },
  {
    ...animation('glTF JSON', 18, [gltf({ ...asset, buffers }), gltf({ ...asset, buffers: beside })], {
      name: 'x.gltf',
      sibling: async (path) => {
        if (path !== 'crane.bin') throw new Error('no such file');
        return bufferSource(data);
      },
    }),
    json: true,
  },
  animation('BVH', 10, [utf8(BOOM)], { name: 'x.bvh' }),
  animation(
    'text of quaternions',
    5,
    [
      '# timestamp_ns tx ty tz qx qy qz qw\n1403636579763555584 1 2 3 0 0 0 1\n1403636579813555456 nan nan nan nan nan nan nan\n1403636579863555328 1 2 3 0 0 1 0\n',
    ].map(utf8),
    { name: 'x.txt' },
  ),
  animation(
    'text of angles',
    5,
    [utf8('time_s,rx_deg,ry_deg,rz_deg,note\n0.000,1,359.50,-1e-2,"a, b"\n0.010,0.25,361.00,.125,\n')],
    { name: 'x.csv', table: { euler: 'YXZ' } },
  ),
  animation(
    'text of matrices and axes',
    4,
    [
      't;m00;m01;m02;m10;m11;m12;m20;m21;m22\n0;1;0;0;0;1;0;0;0;1\n1;0;-1;0;1;0;0;0;0;1\n',
      't\tax\tay\taz\tangle_rad\n0\t0\t0\t1\t0.5\n1\t0\t0\t1\t1.5\n',
    ].map(utf8),
    { name: 'x.tsv' },
  ),
  {
    name: 'house rules',
    share: 20,
    json: true,
    sound: [JSON.stringify(RULES)],
    take: (_, text) => {
      const houseRules = parseHouseRules(JSON.parse(text()));
      surveyTrack(walk, { houseRules, clip, file: 'walk.glb', playbacks: houseRules.playback });
    },
  },
  {
    name: 'job card',
    share: 8,
    json: true,
    sound: STEPS.map((step) =>
      JSON.stringify({
        schemaVersion: 1,
        for: { file: 'walk.glb', sha256: '0'.repeat(64) },
        steps: [step],
      }),
    ),
    take: (_, text) => void applySteps([walk], parseJobCard(JSON.parse(text())).steps),
  },
  {
    name: 'undo plan',
    share: 4,
    json: true,
    sound: [
      patchPlanJson({
        for: { file: 'x', sha256: '1'.repeat(64) },
        resultSha256: '2'.repeat(64),
        plan,
      }),
    ],
    take: (_, text) => {
      const stored = parsePatchPlan(text());
      checkPatchPlan(stored.plan, 60);
      patchedBytes(new Uint8Array(60), stored.plan);
    },
  },
  {
    name: 'stamps',
    share: 2,
    json: true,
    sound: [stampsJson(stampsFor(report, 'jump.lone-key', words))],
    take: (_, text) => void withStamps(report, parseStamps(JSON.parse(text()), 'walk.stamps.json')),
  },
  {
    name: 'baseline',
    share: 2,
    json: true,
    sound: [baselineJson(baselineOf([report]))],
    take: (_, text) => void withBaseline([report], parseBaseline(JSON.parse(text()), 'baseline.json'), true),
  },
  {
    name: 'sentence',
    share: 2,
    sound: STEPS.map(sayStep),
    take: (_, text) => void sayStep(parseSentence(text(), 30)),
  },
  {
    name: 'time',
    share: 2,
    sound: ['1.5 s', 'frame 45', '00:00:01:15', '00:01:00;02'],
    take: (_, text) => expect(readTime(text(), 30_000 / 1001)).not.toBeNaN(),
  },
];

/** What came of a file: read, refused with a code, or no JSON at all, which the readers of JSON files say before any parser. */
type Fate = 'read' | 'refused' | 'no JSON';

async function fateOf(door: Door, bytes: Uint8Array): Promise<Fate> {
  try {
    await door.take(bytes, () => new TextDecoder().decode(bytes));
    return 'read';
  } catch (error) {
    if (error instanceof SyntaxError && door.json) return 'no JSON';
    if (!(error instanceof SlewcurveError)) throw error;
    const { code } = error;
    if (/^[a-z-]+(?:\.[a-z0-9-]+)+$/.test(code) && error.message.length < 2000) return 'refused';
    throw new Error(`an unfit code or message: ${code} ${error.message.length}`, { cause: error });
  }
}

function bytesOf(file: Uint8Array | string): Uint8Array {
  return typeof file === 'string' ? utf8(file) : file;
}

function mutant(door: Door, number: number, random: () => number): Uint8Array {
  const sound = bytesOf(door.sound[number % door.sound.length]);
  if (door.mutate) return door.mutate(random);
  if (!door.json || random() < 0.3) return mutatedBytes(sound, random);
  return utf8(mutatedJson(new TextDecoder().decode(sound), random));
}

function isRange(
  value: unknown,
): value is { seed: number; files: number; doors: Record<string, Record<Fate, number>> } {
  return typeof value === 'object' && value !== null && 'doors' in value;
}

test.each(DOORS)('$name: its sound files are read', async (door) => {
  for (const sound of door.sound) expect(await fateOf(door, bytesOf(sound))).toBe('read');
});

test(`${FILES} files changed at random end in what they hold or in a coded error (seed ${SEED})`, async () => {
  const counts: Record<string, Record<Fate, number>> = {};
  let files = 0;
  const began = process.cpuUsage().user;
  for (const door of DOORS) {
    const random = seededRandom(SEED + files);
    const own: Record<Fate, number> = { read: 0, refused: 0, 'no JSON': 0 };
    const share = Math.round((FILES * door.share) / 100);
    let slowest = 0;
    for (let number = 0; number < share; number++) {
      const bytes = mutant(door, number, random);
      const { user } = process.cpuUsage();
      try {
        own[await fateOf(door, bytes)]++;
      } catch (cause) {
        const shown = Buffer.from(bytes).toString('latin1').slice(0, 1500);
        throw new Error(`${door.name}, file ${number}: ${shown}`, { cause });
      }
      slowest = Math.max(slowest, process.cpuUsage().user - user);
    }
    counts[door.name] = own;
    files += share;
    measured(
      `${door.name}: ${JSON.stringify(own)}, the slowest ${(slowest / 1000).toFixed(0)} ms of the processor`,
    );
    // A file of a few kilobytes takes milliseconds; collecting garbage may fall into any.
    expect(slowest).toBeLessThan(5e6);
    expect(Math.min(own.read, own.refused)).toBeGreaterThan(0);
  }
  measured(`${files} files in ${((process.cpuUsage().user - began) / 1e6).toFixed(1)} s of the processor`);
  expect(files).toBe(FILES);
  if (LONG) writeFileSync(COUNTS, `${JSON.stringify({ seed: SEED, files, doors: counts }, null, 2)}\n`);
  expect(({} as { polluted?: unknown }).polluted).toBeUndefined();
});

test('the counts of the long run are kept: every door, 200,000 files', () => {
  const kept: unknown = JSON.parse(readFileSync(COUNTS, 'utf8'));
  if (!isRange(kept)) throw new Error(COUNTS);
  expect([kept.seed, kept.files]).toEqual([SEED, 200_000]);
  expect(Object.keys(kept.doors)).toEqual(DOORS.map(({ name }) => name));
  const total = Object.values(kept.doors).flatMap((own) => Object.values(own));
  expect(total.reduce((sum, count) => sum + count, 0)).toBe(200_000);
});
