// Real BVH and trajectory files against counts that two independent readers agreed on (../shared/data/counts.json), and orientations
// from an optical system against the gyroscope on the same body (BROAD, D. Laidig et al., Data 6(7), 2021, CC BY 4.0).
import { describe, expect, test } from 'vitest';
import {
  eulerSequence,
  fromEuler,
  keyOrientation,
  logMap,
  measure,
  medianGap,
  playAs,
  relative,
  replaceTrack,
  rotateVector,
  segmentAngle,
  signChanges,
  type RotationTrack,
} from '@slewcurve/core';
import { bufferSource, openAnimation, patchedBytes, type AnimationFile } from '@slewcurve/formats';
import { sharedFile } from '../support/shared-data.js';

interface CountedJoint {
  readonly order: string;
  readonly euler_jumps_over_180: number;
  readonly first_euler_jump_frames: readonly number[];
  readonly naive_quat_sign_flips: number;
  readonly flip_frames: readonly number[];
  readonly isolated_spikes: number;
  readonly spike_frames: readonly number[];
  readonly max_span_deg: number;
  readonly max_span_frame: number;
  readonly spans_over_170: number;
  readonly spans_over_90: number;
  readonly max_deg_per_s: number;
  readonly median_deg_per_s: number;
  readonly constant: boolean;
}

interface CountedBvh {
  readonly joints: number;
  readonly channels: number;
  readonly declared_frames: number;
  readonly rows: number;
  readonly frame_time: number;
  readonly joint: Readonly<Record<string, CountedJoint>>;
}

interface CountedTrajectory {
  readonly samples: number;
  readonly duration_s: number;
  readonly median_dt_s: number;
  readonly gaps_over_2_5x: number;
  readonly sign_flips: number;
  readonly flip_at: readonly number[];
  readonly max_span_deg: number;
  readonly max_span_at: number;
  readonly missing_samples: number;
  readonly missing_runs: number;
  readonly max_norm_error: number;
  readonly median_deg_per_s: number;
  readonly max_deg_per_s: number;
  readonly min_dt_s: number;
  readonly max_dt_s: number;
  readonly non_increasing_times: number;
  readonly spans_over_170: number;
  readonly non_unit_over_1e_3: number;
  readonly isolated_spikes: number;
  readonly spike_at: readonly number[];
  readonly samples_with_abs_x_over_85?: number;
  readonly euler_jump_at?: readonly number[];
}

const DEGREES = 180 / Math.PI;
const counts = sharedFile('data/counts.json');

function counted<Counts>(folder: string): [string, Counts][] {
  if (counts.absent) return [];
  const { files }: { files: Record<string, Counts> } = JSON.parse(new TextDecoder().decode(counts.read()));
  return Object.entries(files).filter(([name]) => name.startsWith(folder));
}

/** What a file does not say of itself: their READMEs do. */
const TABLES = {
  'head-and-hand': { euler: 'YXZ' },
  fr2_desk: { columns: 'timestamp,tx,ty,tz,qx,qy,qz,qw'.split(',') },
};

async function open(name: string): Promise<AnimationFile> {
  const [, table] = Object.entries(TABLES).find(([part]) => name.includes(part)) ?? [];
  return openAnimation(bufferSource(sharedFile(`data/${name}`).read()), { name, ...(table && { table }) });
}

/** `toEqual` takes half a minute over 2 MB. */
const sameBytes = (a: Uint8Array, b: Uint8Array): boolean => Buffer.compare(a, b) === 0;

const tracksOf = (file: AnimationFile): readonly RotationTrack[] =>
  file.clips.flatMap(({ tracks }) => tracks);

interface Segment {
  readonly later: number;
  readonly angle: number;
  readonly rate: number;
}

function segments(track: RotationTrack): Segment[] {
  return Array.from({ length: track.times.length - 1 }, (_, key) => {
    const angle = segmentAngle(track, key) * DEGREES;
    return { later: key + 1, angle, rate: angle / (track.times[key + 1] - track.times[key]) };
  });
}

/** Later keys of the steps in which an angle of an EULER track jumps by more than half a turn. */
function angleJumps({ interpolation, times, values }: RotationTrack): number[] {
  if (interpolation !== 'EULER') return [];
  const jumps = (at: number): boolean => Math.abs(values[at] - values[at - 3]) > Math.PI;
  return Array.from(times.keys())
    .slice(1)
    .filter((key) => [0, 1, 2].some((part) => jumps(3 * key + part)));
}

/** Later keys of the steps across which quaternions made one by one change sides. */
function naiveFlips(track: RotationTrack): number[] {
  const sequence = eulerSequence(track.sequence ?? 'XYZ');
  const quaternions = Array.from(track.times, (_, key) =>
    fromEuler([0, 0, 0, 1], track.values.subarray(3 * key, 3 * key + 3), sequence),
  );
  return Array.from(quaternions.keys())
    .slice(1)
    .filter((key) => quaternions[key].reduce((sum, x, i) => sum + x * quaternions[key - 1][i], 0) < 0);
}

/** Segments faster than 60 deg/s and than six times both neighbours, by their earlier key. */
function spikesOf(speeds: readonly number[]): number[] {
  return Array.from(speeds.keys()).filter(
    (key) =>
      key > 0 &&
      key + 1 < speeds.length &&
      speeds[key] > 60 &&
      speeds[key] > 6 * Math.max(speeds[key - 1], speeds[key + 1]),
  );
}

const widest = (all: readonly Segment[]): Segment =>
  all.reduce((most, one) => (one.angle > most.angle ? one : most));

function median(numbers: readonly number[]): number {
  const sorted = numbers.toSorted((a, b) => a - b);
  const half = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[half] : (sorted[half - 1] + sorted[half]) / 2;
}

describe.skipIf(counts.absent)('BVH files', () => {
  test.each(counted<CountedBvh>('bvh/'))(
    '%s has the joints, orders, spans and speeds that were counted',
    async (name, count) => {
      const file = await open(name);
      expect(file.problems).toEqual([]);
      const tracks = tracksOf(file);
      expect(tracks).toHaveLength(count.joints);
      for (const [joint, expected] of Object.entries(count.joint)) {
        const track = tracks.find(({ id }) => id === joint || id.endsWith(`/${joint}`));
        if (!track) throw new Error(`${joint} has no track`);
        const all = segments(track);
        const most = widest(all);
        expect(track).toMatchObject({ sequence: expected.order, interpolation: 'EULER' });
        expect(track.times).toHaveLength(count.rows);
        expect(medianGap(track)).toBeCloseTo(count.frame_time, 12);
        // The counts are rounded: to 1e-4 degrees, to 0.01 and 0.001 deg/s.
        expect(Math.abs(most.angle - expected.max_span_deg)).toBeLessThan(0.6e-4);
        expect(expected.constant || most.later === expected.max_span_frame).toBe(true);
        expect(Math.abs(Math.max(...all.map(({ rate }) => rate)) - expected.max_deg_per_s)).toBeLessThan(
          0.006,
        );
        expect(Math.abs(median(all.map(({ rate }) => rate)) - expected.median_deg_per_s)).toBeLessThan(
          0.0006,
        );
        expect(all.filter(({ angle }) => angle > 170)).toHaveLength(expected.spans_over_170);
        expect(all.filter(({ angle }) => angle > 90)).toHaveLength(expected.spans_over_90);
        const flips = naiveFlips(track);
        const spikes = spikesOf(all.map(({ rate }) => rate));
        expect([angleJumps(track).length, flips.length, spikes.length]).toEqual([
          expected.euler_jumps_over_180,
          expected.naive_quat_sign_flips,
          expected.isolated_spikes,
        ]);
        // The first ones are listed.
        for (const [found, listed] of [
          [angleJumps(track), expected.first_euler_jump_frames],
          [flips, expected.flip_frames],
          [spikes, expected.spike_frames],
        ])
          expect(found.slice(0, listed.length)).toEqual(listed);
      }
      const text = new TextDecoder('latin1').decode(sharedFile(`data/${name}`).read());
      const named = [...text.matchAll(/CHANNELS\s+(\d+)/gi)].map(([, channels]) => Number(channels));
      expect(named.reduce((sum, x) => sum + x, 0)).toBe(count.channels);
      expect(/Frames:\s*(\d+)/i.exec(text)?.[1]).toBe(String(count.declared_frames));
      // A frame count that lies is a problem, and there are none.
      expect(count.declared_frames).toBe(count.rows);
    },
  );

  test.each(counted<CountedBvh>('bvh/'))(
    '%s comes back byte for byte, and with no byte changed but the numbers that were',
    async (name) => {
      const bytes = sharedFile(`data/${name}`).read();
      const file = await open(name);
      const tracks = tracksOf(file);
      expect(sameBytes(patchedBytes(bytes, await file.plan(tracks)), bytes)).toBe(true);
      const [first] = tracks;
      const values = first.values.slice();
      values[4] += 0.5;
      const plan = await file.plan([replaceTrack(first, { values })]);
      expect(plan.ranges).toHaveLength(1);
      const [{ at, length, bytes: made }] = plan.ranges;
      const patched = Buffer.from(patchedBytes(bytes, plan)).toString('latin1');
      const text = Buffer.from(bytes).toString('latin1');
      expect(patched).toBe(
        text.slice(0, at) + Buffer.from(made).toString('latin1') + text.slice(at + length),
      );
      expect(text.slice(at, at + length)).toMatch(/^ *-?\d*\.?\d+$/);
    },
  );

  test('sinusoidal.bvh turns at exactly 60 deg/s', async () => {
    const track = tracksOf(await open('bvh/synthetic/sinusoidal.bvh')).find(({ id }) =>
      id.endsWith('child2'),
    );
    if (!track) throw new Error('no child2');
    const curve = playAs(track, 'as-written');
    const { peakRate, medianRate } = measure(curve);
    // Whole degrees a frame and a frame time of 17 digits: float64 rounding is left.
    expect(peakRate * DEGREES).toBeCloseTo(60, 9);
    expect(medianRate * DEGREES).toBeCloseTo(60, 9);
  });
});

function lengthErrors({ times, values }: RotationTrack): number[] {
  return Array.from(times, (_, key) => Math.abs(Math.hypot(...values.subarray(4 * key, 4 * key + 4)) - 1));
}

describe.skipIf(counts.absent)('trajectories', () => {
  test.each(counted<CountedTrajectory>('trajectories/'))(
    '%s has the samples, holes and spans that were counted',
    async (name, count) => {
      const file = await open(name);
      const [track] = tracksOf(file);
      // The counts pass over pairs with a lost sample between, and not over long gaps.
      const held = new Set(count.missing_samples > 0 ? track.breaks : []);
      const all = segments(track).filter(({ later }) => !held.has(later - 1));
      const most = widest(all);
      expect(track.times).toHaveLength(count.samples - count.missing_samples);
      expect(track.breaks).toHaveLength(count.missing_runs + count.gaps_over_2_5x);
      // The counts' clock is float64 of the epoch (2.4e-7 s); ours loses nothing.
      expect(Math.abs((track.times.at(-1) ?? NaN) - track.times[0] - count.duration_s)).toBeLessThan(5e-7);
      expect(Math.abs(medianGap(track) - count.median_dt_s)).toBeLessThan(5e-7);
      expect(Math.abs(most.angle - count.max_span_deg)).toBeLessThan(0.6e-4);
      const rows = count.missing_samples === 0;
      expect(!rows || most.later === count.max_span_at).toBe(true);
      expect(Math.abs(median(all.map(({ rate }) => rate)) - count.median_deg_per_s)).toBeLessThan(0.02);
      expect(signChanges(track)).toEqual(track.interpolation === 'LINEAR' ? count.flip_at : []);
      expect(angleJumps(track)).toEqual(count.euler_jump_at ?? []);
      const gaps = Array.from(track.times.subarray(1), (time, key) => time - track.times[key]).filter(
        (_, key) => rows || !held.has(key),
      );
      // Their clock again.
      expect(Math.abs(Math.min(...gaps) - count.min_dt_s)).toBeLessThan(5e-7);
      expect(Math.abs(Math.max(...gaps) - count.max_dt_s)).toBeLessThan(5e-7);
      expect(gaps.filter((gap) => !(gap > 0))).toHaveLength(count.non_increasing_times);
      expect(all.filter(({ angle }) => angle > 170)).toHaveLength(count.spans_over_170);
      const norms = track.interpolation === 'LINEAR' ? lengthErrors(track) : [0];
      expect(norms.filter((error) => error > 1e-3)).toHaveLength(count.non_unit_over_1e_3);
      // Angles make quaternions that are off by rounding alone.
      expect(Math.abs(Math.max(...norms) - count.max_norm_error)).toBeLessThan(1e-12);
      const speeds = all.map(({ rate }) => rate);
      // Two places, and their clock: 2.4e-7 s of the shortest gap.
      const fastest = Math.max(...speeds);
      expect(Math.abs(fastest - count.max_deg_per_s)).toBeLessThan(0.006 + (5e-7 / count.min_dt_s) * fastest);
      const spikes = spikesOf(speeds);
      expect([spikes.length, spikes.slice(0, count.spike_at.length)]).toEqual([
        count.isolated_spikes,
        count.spike_at,
      ]);
      const steep = Array.from(track.times.keys()).filter(
        (key) => Math.abs(track.values[3 * key + 1]) * DEGREES > 85,
      );
      expect(track.interpolation === 'LINEAR' ? 0 : steep.length).toBe(count.samples_with_abs_x_over_85 ?? 0);
    },
  );

  test.each(counted<CountedTrajectory>('trajectories/'))('%s comes back byte for byte', async (name) => {
    const bytes = sharedFile(`data/${name}`).read();
    const file = await open(name);
    expect(sameBytes(patchedBytes(bytes, await file.plan(tracksOf(file))), bytes)).toBe(true);
  });

  test.each(['imu-log/sensor_data.csv', 'orientation-benchmark/slow_rotation_gyro.csv'])(
    '%s, which holds no orientation, is refused for that',
    async (name) => {
      await expect(open(`trajectories/${name}`)).rejects.toMatchObject({ code: 'delimited.unnamed-columns' });
    },
  );
});

const gyroscope = sharedFile('data/trajectories/orientation-benchmark/slow_rotation_gyro.csv');

/** Mean rates of the segments in both frames, and the gyroscope's at mid-segment, rad/s; three numbers a segment. */
async function rates(name: string): Promise<{ own: number[]; parent: number[]; measured: number[] }> {
  const [track] = tracksOf(await open(`trajectories/orientation-benchmark/${name}.txt`));
  const text = new TextDecoder().decode(
    sharedFile(`data/trajectories/orientation-benchmark/${name}_gyro.csv`).read(),
  );
  const rows = text
    .trim()
    .split('\n')
    .slice(1)
    .map((line) => line.split(',').map(Number));
  const at = new Map(rows.map(([time, ...rate]) => [time, rate]));
  const held = new Set(track.breaks);
  const own: number[] = [];
  const parent: number[] = [];
  const measured: number[] = [];
  for (let key = 0; key + 1 < track.times.length; key++) {
    const before = at.get(track.times[key]);
    const after = at.get(track.times[key + 1]);
    if (held.has(key) || !before || !after) continue;
    const q = keyOrientation([0, 0, 0, 1], track, key);
    const step = relative([0, 0, 0, 1], q, keyOrientation([0, 0, 0, 1], track, key + 1));
    const rate = logMap([0, 0, 0], step).map((part) => part / (track.times[key + 1] - track.times[key]));
    own.push(...rate);
    parent.push(...rotateVector([0, 0, 0], q, rate));
    measured.push(...before.map((part, axis) => (part + after[axis]) / 2));
  }
  return { own, parent, measured };
}

/** Pearson's, over the three axes pooled. */
function correlation(a: readonly number[], b: readonly number[]): number {
  const [meanA, meanB] = [mean(a), mean(b)];
  const sum = (of: (i: number) => number): number => a.reduce((total, _, i) => total + of(i), 0);
  return (
    sum((i) => (a[i] - meanA) * (b[i] - meanB)) /
    Math.sqrt(sum((i) => (a[i] - meanA) ** 2) * sum((i) => (b[i] - meanB) ** 2))
  );
}

function mean(numbers: readonly number[]): number {
  return numbers.reduce((sum, x) => sum + x, 0) / numbers.length;
}

describe.skipIf(gyroscope.absent)('against the gyroscope on the same body', () => {
  test('own-frame rates are what it measured, parent-frame rates are not', async () => {
    const { own, parent, measured } = await rates('slow_rotation');
    expect(own.length).toBe(3 * 8570);
    expect(correlation(own, measured)).toBeGreaterThanOrEqual(0.99);
    expect(correlation(parent, measured)).toBeLessThanOrEqual(0.97);
  });

  test('the same in a fast take with lost samples', async () => {
    const { own, parent, measured } = await rates('fast_combined_with_dropouts');
    expect(correlation(own, measured)).toBeGreaterThanOrEqual(0.99);
    expect(correlation(parent, measured)).toBeLessThanOrEqual(0.97);
  });
});
