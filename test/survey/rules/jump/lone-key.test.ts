import { describe, expect, test } from 'vitest';
import { angleFloor, rotationTrack, type RotationTrack, type Storage } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { surveyTrack } from '@slewcurve/survey';
import { grid, keyed, turned, type Motion } from '../../../support/smooth-track.js';
import { measured } from '../../../support/measured.js';
import { randomQuaternion, seededRandom } from '../../../support/seeded-random.js';

const DEGREES = 180 / Math.PI;
const SEED = 20_261;

function jumps(track: RotationTrack) {
  return surveyTrack(track).filter((finding) => finding.rule.startsWith('jump.'));
}

/** A motion with a spin of up to 60 deg/s and swings of up to 40°, up to 0.6 Hz. */
function anyMotion(random: () => number): Motion {
  const within = (most: number): number => (2 * random() - 1) * most;
  return {
    spin: [within(60), within(60), within(60)],
    swing: [within(40), within(40), within(40)],
    hertz: 0.1 + 0.5 * random(),
    phase: 6 * random(),
  };
}

/** Turn about x by an angle in degrees at each time, for two seconds. */
function hinge(angle: (time: number) => number): RotationTrack {
  const times = grid(61);
  const values = times.flatMap((time) => {
    const half = angle(time) / 2 / DEGREES;
    return [Math.sin(half), 0, 0, Math.cos(half)];
  });
  return rotationTrack({ times, values });
}

/** Minimum-jerk step. */
function ease(u: number): number {
  return u ** 3 * (10 - 15 * u + 6 * u * u);
}

/** Components rounded as a file would store them. */
function stored(track: RotationTrack, component: Storage['component']): RotationTrack {
  const steps: Partial<Record<Storage['component'], number>> = { int16: 32767, int8: 127 };
  const step = steps[component];
  const values = track.values.map((value) => (step ? Math.round(value * step) / step : Math.fround(value)));
  return rotationTrack({ ...track, values, storage: { component, timeComponent: 'float32' } });
}

/** An offset of so many degrees about a random axis. */
function offset(random: () => number, degrees: number): [number, number, number] {
  const [x = 0, y = 0, z = 0] = randomQuaternion(random);
  const scale = degrees / Math.hypot(x, y, z);
  return [x * scale, y * scale, z * scale];
}

describe('jump.lone-key', () => {
  // NEEDS A6: one outlier of up to 120° each in 100 tracks; recall at least 0.99 from so many noise floors up (and 2°), nothing on
  // the clean ones. Normalised bytes (floor 0.90°) need thirteen floors instead of five: the floor enters the gain as 70·9·f², so
  // that a gain of 16 takes an outlier of √(16·9) = 12 floors whatever else is there.
  test.each([
    ['float32', 30, 5],
    ['float32', 60, 5],
    ['int16', 30, 5],
    ['int8', 30, 13],
  ] as const)(
    'A6 on %s at %s keys a second from %s noise floors (seed 20261): every outlier is named, no clean track is',
    (component, hertz, floors) => {
      const random = seededRandom(SEED);
      const least = Math.max(2, floors * angleFloor({ component, timeComponent: 'float32' }) * DEGREES);
      let named = 0;
      let others = 0;
      let falseAlarms = 0;
      let stepAlarms = 0;
      for (let i = 0; i < 100; i++) {
        const smooth = keyed(anyMotion(random), grid(90, hertz), 'LINEAR');
        const key = 4 + Math.floor(random() * 82);
        const size = least * (120 / least) ** random();
        const popped = stored(turned(smooth, [key], offset(random, size)), component);
        const found = jumps(popped).flatMap((finding) =>
          finding.occurrences.map((place) => [finding.rule, place.keys[0]] as const),
        );
        if (found.some(([rule, at]) => rule === 'jump.lone-key' && at === key)) named++;
        others += found.filter(([rule, at]) => rule !== 'jump.lone-key' || at !== key).length;
        falseAlarms += jumps(stored(smooth, component)).length;
        stepAlarms += surveyTrack(rotationTrack({ ...popped, interpolation: 'STEP' })).length;
      }
      measured(
        `A6 ${component} ${hertz}/s: named ${named} of 100 outliers of ${least.toFixed(1)} to 120°; ${others} other places; ${falseAlarms} false alarms on 100 clean tracks; ${stepAlarms} findings on STEP`,
      );
      expect(named).toBeGreaterThanOrEqual(99);
      expect(falseAlarms).toBe(0);
      expect(stepAlarms).toBe(0);
      expect(others).toBe(0);
    },
  );

  test('the finding names the key, its size, its neighbours’ span and a confidence, and lifting it out ends it', () => {
    const smooth = keyed({ spin: [0, 30, 0], swing: [5, 0, 0], hertz: 0.3, phase: 0 }, grid(60), 'LINEAR');
    const track = turned(smooth, [30], [0, 0, 12.4]);
    const [finding, ...rest] = jumps(track);
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({
      rule: 'jump.lone-key',
      level: 'warning',
      keys: [30],
      limit: 1,
      count: 1,
    });
    expect(finding.value).toBeCloseTo(12.4, 1);
    expect(finding.span).toEqual([29 / 30, 31 / 30]);
    expect(finding.confidence).toBeGreaterThan(0.99);
    expect(finding.message).toBe('key 30 stands 12.4° off its neighbours for one frame (limit 1.0°)');
    expect(finding.remedy).toMatchObject({ verb: 'lift out', keys: [30] });
    expect(finding.price).toBeCloseTo(12.4, 1);
    expect(jumps(verbNamed('lift out').apply(track, finding.remedy!).track)).toEqual([]);
  });

  test('NEEDS A6’s 0, 1, 91, 3, 4° at 30 frames a second inside a clip is one lone key', () => {
    const times = grid(31);
    const values = times.flatMap((_, key) => {
      const half = (key === 15 ? 106 : key) / 2 / DEGREES;
      return [0, Math.sin(half), 0, Math.cos(half)];
    });
    expect(jumps(rotationTrack({ times, values })).map((finding) => [finding.rule, finding.keys])).toEqual([
      ['jump.lone-key', [15]],
    ]);
  });

  test('a dead stop, a bounce within one frame and a whip of 180° in 0.4 s are no lone keys', () => {
    expect(jumps(hinge((time) => Math.min(time, 1) * 200))).toEqual([]);
    expect(jumps(hinge((time) => Math.abs(time - 1) * 200))).toEqual([]);
    expect(jumps(hinge((time) => 180 * ease(Math.min(1, Math.max(0, (time - 0.8) / 0.4)))))).toEqual([]);
  });

  test('limits go by role: 0.5° is a pop for a camera, not for a prop', () => {
    const track = turned(
      keyed({ spin: [0, 30, 0], swing: [0, 0, 0], hertz: 0.3, phase: 0 }, grid(60), 'LINEAR'),
      [30],
      [0.5, 0, 0],
    );
    const node = { path: 'Arm', parent: -1, rotation: [], translation: [], scale: [], joint: false };
    const placed = rotationTrack({ ...track, source: { ...track.source, node: 0 } });
    expect(surveyTrack(placed, { nodes: [node] })).toEqual([]);
    const camera = { ...node, camera: { verticalView: 1 } };
    // A camera’s pan that starts and stops at 30 deg/s is another family’s to find.
    const found = surveyTrack(placed, { nodes: [camera] }).filter(({ rule }) => rule.startsWith('jump.'));
    expect(found).toMatchObject([{ rule: 'jump.lone-key', limit: 0.25 }]);
  });

  test('sparse tracks are spared: each of their keys is a decision', () => {
    const track = turned(
      keyed({ spin: [0, 3, 0], swing: [0, 0, 0], hertz: 0.1, phase: 0 }, grid(30, 5), 'LINEAR'),
      [15],
      [9, 0, 0],
    );
    expect(jumps(track)).toEqual([]);
  });
});
