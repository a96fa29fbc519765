import { type RotationTrack, angleBetween, playAs, rotationTrack } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf } from '../support/edit-acceptance.js';
import { type Motion, grid, keyed, motions, poseAt } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 6 });

const DEGREES = 180 / Math.PI;
const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;
const PAN = { spin: [0, 60, 0], swing: [0, 0, 0], hertz: 1, phase: 0 } as const;

/** Frames at 24 a second shown on a grid of 30 by the nearest one. */
function nearest(motion: Motion, frames: number): RotationTrack {
  const shown = Array.from({ length: frames }, (_, frame) => Math.round((frame * 24) / 30) / 24);
  const poses = shown.map((time) => keyed(motion, [time, time + 1], 'LINEAR').values.subarray(0, 4));
  return rotationTrack({ times: grid(frames, 30), values: poses.flatMap((pose) => [...pose]) });
}

/** Speeds of segments, deg/s. */
function speeds(track: RotationTrack): number[] {
  const curve = playAs(track, 'as-written');
  return Array.from(track.times.subarray(1), (time, key) => {
    const from = track.times[key];
    return (curve.length(from, time) / (time - from)) * DEGREES;
  });
}

/** How far the speeds of inner segments are off 60 deg/s. */
function inner(track: RotationTrack): number[] {
  return speeds(track)
    .slice(2, -2)
    .map((speed) => Math.abs(speed - 60));
}

/** Largest distance of a track as written from a motion, degrees; `margin` seconds at either end are left out. */
function offMotion(track: RotationTrack, motion: Motion, margin = 0): number {
  const curve = playAs(track, 'as-written');
  let most = 0;
  for (let t = curve.start + margin; t <= curve.end - margin; t += 1 / 480)
    most = Math.max(most, angleBetween(curve.orientation([], t), poseAt(motion, t)) * DEGREES);
  return most;
}

describe('re-grid', () => {
  it('takes the comb off 24 frames a second shown at 30: 20 % still frames and 75 for 60 deg/s become 60 deg/s', () => {
    const comb = nearest(PAN, 151);
    // RULES' own figures, measured there.
    expect(speeds(comb).filter((speed) => speed < 1e-6).length / 150).toBeCloseTo(0.2, 2);
    expect(Math.max(...speeds(comb))).toBeCloseTo(75, 6);
    const { track } = applied(comb, { verb: 're-grid', fps: 30, source: 24 });
    expect(track.times).toEqual(comb.times);
    // The last key may stand before the clip's end, and is held there.
    for (const speed of speeds(track).slice(0, -1)) expect(speed).toBeCloseTo(60, 6);
  });

  it('keeps a rest while it takes the comb off', () => {
    const comb = nearest(PAN, 61);
    const rest = comb.values.map((part, i) =>
      i >= 4 * 30 && i < 4 * 45 ? comb.values[4 * 30 + (i % 4)] : part,
    );
    const track = applied(rotationTrack({ ...comb, values: rest }), {
      verb: 're-grid',
      fps: 30,
      source: 24,
    }).track;
    const still = speeds(track).slice(31, 42);
    expect(Math.max(...still)).toBeLessThan(1e-6);
  });

  it('stays on a smooth motion when the grid gets finer, the end included, to the sag of short arcs', () => {
    fc.assert(
      fc.property(motions, fc.constantFrom(48, 60, 90), (motion, fps) => {
        const track = keyed(motion, grid(31, 30), 'LINEAR');
        const { track: after } = applied(track, { verb: 're-grid', fps });
        expect(after.times[after.times.length - 1]).toBe(1);
        expect(after.times[1]).toBe(1 / fps);
        // Every new key lies on the old arcs: it can only cut their corners.
        expect(offMotion(after, motion)).toBeLessThan(offMotion(track, motion) * 2 + 1e-6);
      }),
      { numRuns: 20 },
    );
  });

  it('reads the spline through the keys where that playback is named', () => {
    const track = keyed(WAVE, grid(16, 15), 'LINEAR');
    const linear = applied(track, { verb: 're-grid', fps: 60 }).track;
    const smooth = applied(track, { verb: 're-grid', fps: 60, playback: 'finite-cubic' }).track;
    // At the ends a spline knows one side alone.
    expect(offMotion(smooth, WAVE, 0.15)).toBeLessThan(offMotion(linear, WAVE, 0.15) / 4);
  });

  it('filters first on a coarser grid: 55 Hz at 120 a second does not come back as 5 Hz at 60, and steady motion is left alone', () => {
    const hum = (time: number): Motion => ({
      ...PAN,
      swing: [0, Math.sin(2 * Math.PI * 55 * time), 0],
      hertz: 0,
      phase: Math.PI / 2,
    });
    const times = grid(241, 120);
    const values = times.flatMap((time) => [...poseAt(hum(time), time)]);
    const noisy = rotationTrack({ times, values });
    const { track } = applied(noisy, { verb: 're-grid', fps: 60 });
    const picked = rotationTrack({
      times: grid(121, 60),
      values: values.filter((_, i) => Math.floor(i / 4) % 2 === 0),
    });
    // Picked frames swing by an alias of 5 Hz and 1°: 31 deg/s; the filter leaves under a twelfth of that.
    expect(Math.max(...inner(picked))).toBeGreaterThan(25);
    expect(Math.max(...inner(track))).toBeLessThan(Math.max(...inner(picked)) / 10);
    const pan = applied(keyed(PAN, times, 'LINEAR'), { verb: 're-grid', fps: 24 }).track;
    expect(offMotion(pan, PAN)).toBeLessThan(1e-6);
  });

  it('keeps cubics cubic, angles angles in their sequence, and their orientations', () => {
    const cubic = keyed(WAVE, grid(31, 30), 'CUBICSPLINE');
    const finer = applied(cubic, { verb: 're-grid', fps: 60, within: 0.001 }).track;
    expect(finer.interpolation).toBe('CUBICSPLINE');
    const angles = rotationTrack({
      times: grid(11, 10),
      values: grid(11, 10).flatMap((t) => [2 * t, 0.3, t]),
      interpolation: 'EULER',
      sequence: 'ZXY',
    });
    const again = applied(angles, { verb: 're-grid', fps: 30 }).track;
    expect([again.interpolation, again.sequence]).toEqual(['EULER', 'ZXY']);
    const [was, is] = [playAs(angles, 'as-written'), playAs(again, 'as-written')];
    for (const t of again.times)
      expect(angleBetween(was.orientation([], t), is.orientation([], t))).toBeLessThan(1e-9);
  });

  it('refuses what it would change by more than is allowed, repeats among cubics, and more keys than anybody has', () => {
    const endless = rotationTrack({ times: [0, 1e9], values: [0, 0, 0, 1, 0, 0, 1, 0] });
    expect(codeOf(() => applied(endless, { verb: 're-grid', fps: 30 }))).toBe('step.too-many-frames');
    const track = keyed({ ...WAVE, hertz: 3 }, grid(61, 60), 'LINEAR');
    expect(codeOf(() => applied(track, { verb: 're-grid', fps: 12, within: 0.1 }))).toBe(
      'step.beyond-tolerance',
    );
    const cubic = keyed(WAVE, grid(31, 30), 'CUBICSPLINE');
    expect(codeOf(() => applied(cubic, { verb: 're-grid', fps: 30, source: 24 }))).toBe('step.no-repeats');
    expect(codeOf(() => applied(cubic, { verb: 're-grid', fps: 30, keep: [3] }))).toBe('step.whole-track');
  });
});
