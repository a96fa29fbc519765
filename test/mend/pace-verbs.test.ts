import {
  type RotationTrack,
  angleBetween,
  keyOrientation,
  measure,
  playAs,
  rotationSpline,
  rotationTrack,
  segmentAngle,
} from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf, numbersOf } from '../support/edit-acceptance.js';
import { offThePath, peakOf, repaced, travelled } from '../support/pace-acceptance.js';
import { grid, keyed, motions, smoothTracks } from '../support/smooth-track.js';
import { anyTrack } from '../support/any-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 15, endOnFailure: true };
const DEGREES = 180 / Math.PI;

const sparse = anyTrack(1.5);
const dense = fc
  .tuple(motions, fc.constantFrom('LINEAR' as const, 'CUBICSPLINE' as const))
  .map(([motion, interpolation]) => keyed(motion, grid(60), interpolation));
const played = fc.oneof(sparse, dense);

describe('even out', () => {
  it('keeps every value of a sparse track to the bit and turns at one speed', () => {
    fc.assert(
      fc.property(sparse, (track) => {
        const result = repaced(track, { verb: 'even out' });
        expect(result.track.values).toEqual(track.values);
        expect(result.repaced.price.seconds).toBeCloseTo(0, 12);
        const { peakRate, medianRate } = measure(playAs(result.track, 'as-written'));
        expect(peakRate / medianRate).toBeLessThan(1.000001);
        expect(Math.abs(travelled(result.track) - travelled(track))).toBeLessThan(0.01);
      }),
      RUNS,
    );
  });

  it('reads a dense track at its frames: keys on the old path, one speed within 1 %', () => {
    fc.assert(
      fc.property(dense, (track) => {
        fc.pre(travelled(track) > 5);
        const result = repaced(track, { verb: 'even out' });
        expect(result.track.times).toEqual(track.times);
        expect(offThePath(track, result)).toBeLessThan(0.001);
        const mean = travelled(track) / (track.times[59] - track.times[0]);
        const curve = playAs(result.track, 'as-written');
        const off = Array.from(track.times.subarray(1), (time, i) =>
          Math.abs((curve.length(track.times[i], time) * DEGREES * 30) / mean - 1),
        );
        // Chords cut the path where it bends: the worst frame of a hairpin may lose more than the others.
        off.sort((a, b) => a - b);
        expect(off[Math.floor(off.length * 0.9)]).toBeLessThan(0.01);
        // Where frames resolve the bends at the new speed no angle is lost; where they do not, the price says so.
        const lost = Math.abs(travelled(result.track) - travelled(track));
        expect(result.repaced.price.degrees < 0.005 ? lost : 0).toBeLessThan(0.01);
      }),
      RUNS,
    );
  });
});

describe('cap', () => {
  it('brings the speed of any track down to the limit, and adds time', () => {
    fc.assert(
      fc.property(played, fc.double({ min: 0.3, max: 0.95, noNaN: true }), (track, share) => {
        fc.pre(peakOf(track) > 1);
        const rate = peakOf(track) * share;
        const result = repaced(track, { verb: 'cap', rate });
        expect(peakOf(result.track)).toBeLessThanOrEqual(rate * 1.005);
        expect(result.repaced.price.seconds).toBeGreaterThan(0);
        expect(offThePath(track, result)).toBeLessThan(0.001);
      }),
      RUNS,
    );
  });

  it('leaves a track that is legal as it is', () => {
    fc.assert(
      fc.property(sparse, (track) => {
        const result = repaced(track, { verb: 'cap', rate: 2 * peakOf(track) + 1 });
        expect(result.changed).toEqual([]);
        expect(result.track).toBe(track);
      }),
      RUNS,
    );
  });

  it('refuses a limit of acceleration where the path has corners', () => {
    const [track] = fc.sample(
      sparse.filter((candidate) => candidate.times.length > 3),
      { numRuns: 1, seed: 1 },
    );
    expect(codeOf(() => repaced(track, { verb: 'cap', rate: 5, acceleration: 5 }))).toBe('step.corners');
    expect(codeOf(() => repaced(track, { verb: 'cap' }))).toBe('step.needs-rate');
  });
});

describe('ease in/out', () => {
  it('starts and stops at rest, visits every key of a sparse track to the bit, and peaks as its law says', () => {
    fc.assert(
      fc.property(sparse, (track) => {
        const result = repaced(track, { verb: 'ease in/out' });
        const seconds = track.times[track.times.length - 1] - track.times[0];
        for (let key = 0; key < track.times.length; key++) {
          const at = result.track.times.indexOf(result.repaced.retiming.newTime(track.times[key]));
          expect(numbersOf(result.track, at)).toEqual(numbersOf(track, key));
        }
        const curve = playAs(result.track, 'as-written');
        const { start, end } = curve;
        expect((curve.length(start, start + 1 / 30) * DEGREES) / travelled(track)).toBeLessThan(0.02);
        expect((curve.length(end - 1 / 30, end) * DEGREES) / travelled(track)).toBeLessThan(0.02);
        expect(peakOf(result.track)).toBeLessThan(((1.875 * travelled(track)) / seconds) * 1.001);
        expect(Math.abs(travelled(result.track) - travelled(track))).toBeLessThan(0.01);
      }),
      RUNS,
    );
  });

  it('with shoulders at one end leaves the other end running', () => {
    const track = rotationTrack({
      times: grid(61),
      values: grid(61).flatMap((t) => [0, Math.sin(t / 2), 0, Math.cos(t / 2)]),
    });
    const out = repaced(track, { verb: 'ease in/out', shoulders: 0.5, which: 'out', ends: 'run' });
    expect(out.repaced.price.seconds).toBeCloseTo(0.5, 9);
    const rate = (t: number): number =>
      Math.hypot(...playAs(out.track, 'as-written').rate([0, 0, 0], t, 'own'));
    expect(rate(0.01)).toBeCloseTo(1, 6);
    expect(rate(2.49)).toBeLessThan(0.01);
  });

  it('refuses an ease that it does not know, and one that runs back', () => {
    const [track] = fc.sample(sparse, { numRuns: 1, seed: 1 });
    expect(codeOf(() => repaced(track, { verb: 'ease in/out', ease: 'bouncy' }))).toBe('step.unknown-ease');
    expect(codeOf(() => repaced(track, { verb: 'ease in/out', ease: 'cubic-bezier(0.5, -1, 0.5, 2)' }))).toBe(
      'pace.runs-back',
    );
  });
});

describe('shape', () => {
  it('presses the speed and keeps the area: ends stay, keys lie on the path', () => {
    fc.assert(
      fc.property(
        played,
        fc.double({ min: 0.2, max: 0.8, noNaN: true }),
        fc.double({ min: -40, max: 40, noNaN: true }),
        (track, share, by) => {
          const { times } = track;
          const length = times[times.length - 1] - times[0];
          const step = { verb: 'shape', at: times[0] + share * length, by, reach: length / 5 };
          const code = codeOf(() => repaced(track, step));
          expect([undefined, 'pace.too-little-to-borrow']).toContain(code);
          if (code !== undefined) return;
          const result = repaced(track, step);
          expect(result.repaced.price.seconds).toBeCloseTo(0, 9);
          expect(offThePath(track, result)).toBeLessThan(0.001);
          const lost = Math.abs(travelled(result.track) - travelled(track));
          expect(result.repaced.price.degrees < 0.005 ? lost : 0).toBeLessThan(0.01);
        },
      ),
      RUNS,
    );
  });

  it('lets time run: pressed up, the span gets shorter', () => {
    const [track] = fc.sample(sparse, { numRuns: 1, seed: 3 });
    const result = repaced(track, { verb: 'shape', at: 0.8, by: 20, reach: 0.3, ends: 'run' });
    expect(result.repaced.price.seconds).toBeLessThan(0);
    expect(codeOf(() => repaced(track, { verb: 'shape', at: 0.8 }))).toBe('step.needs-press');
  });
});

describe('set marks', () => {
  it('puts each mark within half a frame, here within 0.05°, and never runs back', () => {
    const share = fc.double({ min: 0.1, max: 0.9, noNaN: true });
    fc.assert(
      fc.property(played, share, share, (track, from, to) => {
        const { times } = track;
        const place = (u: number): number => times[0] + u * (times[times.length - 1] - times[0]);
        const old = playAs(track, 'as-written');
        fc.pre(old.length(times[0], place(from)) > 0.01 && old.length(place(from), old.end) > 0.01);
        const result = repaced(track, { verb: 'set marks', marks: [[place(from), place(to)]] });
        const now = playAs(result.track, 'as-written');
        const wanted = old.orientation([], place(from));
        // Half a frame at 30 frames a second, at the speed there.
        const [early, late] = [place(to) - 1 / 60, place(to) + 1 / 60];
        const most = now.length(early, late) * DEGREES + 0.05;
        expect(angleBetween(now.orientation([], place(to)), wanted) * DEGREES).toBeLessThan(most);
        expect(offThePath(track, result)).toBeLessThan(0.001);
        let before = -Infinity;
        for (const time of result.track.times) {
          const at = result.repaced.retiming.oldTime(time);
          expect(at).toBeGreaterThanOrEqual(before);
          before = at;
        }
      }),
      RUNS,
    );
    const [track] = fc.sample(sparse, { numRuns: 1, seed: 3 });
    expect(codeOf(() => repaced(track, { verb: 'set marks' }))).toBe('step.needs-marks');
    expect(codeOf(() => repaced(track, { verb: 'set marks', marks: [[99, 1]] }))).toBe('pace.bad-marks');
  });
});

describe('hold', () => {
  it('stands still for as long as asked; what follows comes as much later', () => {
    fc.assert(
      fc.property(
        played,
        fc.double({ min: 0.1, max: 0.9, noNaN: true }),
        fc.constantFrom(0, 0.2),
        (track, share, shoulders) => {
          const { times } = track;
          const last = times.length - 1;
          const at = times[0] + share * (times[last] - times[0]);
          const result = repaced(track, {
            verb: 'hold',
            at,
            seconds: 0.5,
            ...(shoulders > 0 && { shoulders }),
          });
          const curve = playAs(result.track, 'as-written');
          const begins = result.repaced.retiming.newTime(at);
          expect(curve.length(begins, begins + 0.5) * DEGREES).toBeLessThan(1e-6);
          expect(
            angleBetween(curve.orientation([], begins), playAs(track, 'as-written').orientation([], at)) *
              DEGREES,
          ).toBeLessThan(1e-6);
          const later = Math.min(shoulders, at - times[0]) + Math.min(shoulders, times[last] - at);
          expect(result.repaced.price.seconds).toBeCloseTo(0.5 + later, 6);
          expect(
            angleBetween(
              keyOrientation([], result.track, result.track.times.length - 1),
              keyOrientation([], track, last),
            ),
          ).toBe(0);
        },
      ),
      RUNS,
    );
  });
});

describe('stretch and shrink', () => {
  it('scale every speed by one factor and keep every value but cubic tangents to the bit', () => {
    fc.assert(
      fc.property(played, fc.double({ min: 0.3, max: 3, noNaN: true }), (track, factor) => {
        fc.pre(Math.abs(factor - 1) > 0.01);
        const { times } = track;
        const length = times[times.length - 1] - times[0];
        const verb = factor > 1 ? 'stretch' : 'shrink';
        const result = repaced(track, { verb, seconds: factor * length });
        expect(peakOf(result.track) * factor).toBeCloseTo(peakOf(track), 5);
        expect(result.repaced.price.degrees).toBeLessThan(1e-6);
        expect(offThePath(track, result)).toBeLessThan(1e-6);
      }),
      RUNS,
    );
    const [track] = fc.sample(sparse, { numRuns: 1, seed: 1 });
    expect(codeOf(() => repaced(track, { verb: 'stretch', seconds: 0.01 }))).toBe('step.bad-length');
  });
});

describe('reverse', () => {
  it('plays q(T − t), and twice gives the track back', () => {
    fc.assert(
      fc.property(
        fc.oneof(
          sparse,
          dense,
          smoothTracks.filter(({ interpolation }) => interpolation !== 'STEP'),
        ),
        (track) => {
          const result = repaced(track, { verb: 'reverse' });
          expect(result.repaced.price.degrees).toBeLessThan(1e-5);
          expect(travelled(result.track)).toBeCloseTo(travelled(track), 6);
          const back = repaced(result.track, { verb: 'reverse' });
          expect(back.track.values).toEqual(track.values);
          for (let key = 0; key < track.times.length; key++)
            expect(back.track.times[key]).toBeCloseTo(track.times[key], 12);
        },
      ),
      RUNS,
    );
  });
});

function through(track: RotationTrack, step: object): unknown {
  return verbNamed('ease through').apply(track, { verb: 'ease through', clip: '', track: '', ...step });
}

describe('there and back', () => {
  it('plays to the end and the same way back; the old keys stay to the bit', () => {
    fc.assert(
      fc.property(played, (track) => {
        const result = repaced(track, { verb: 'there and back' });
        const { times } = track;
        const end = times[times.length - 1];
        expect(result.track.times).toHaveLength(2 * times.length - 1);
        expect(result.repaced.price.degrees).toBeLessThan(1e-5);
        expect(result.repaced.price.seconds).toBeCloseTo(end - times[0], 9);
        expect(travelled(result.track)).toBeCloseTo(2 * travelled(track), 6);
        const curve = playAs(result.track, 'as-written');
        for (const ago of [0.01, 0.3, 0.77].map((share) => share * (end - times[0])))
          expect(
            angleBetween(curve.orientation([], end - ago), curve.orientation([], end + ago)),
          ).toBeLessThan(1e-9);
      }),
      RUNS,
    );
  });
});

describe('ease through', () => {
  it('passes every key at its time, has no corner left, and stays within 0.01° of the spline', () => {
    fc.assert(
      fc.property(sparse, (track) => {
        fc.pre(track.times.length > 2);
        const {
          track: after,
          inserted,
          added,
        } = verbNamed('ease through').apply(track, {
          verb: 'ease through',
          clip: '',
          track: '',
        });
        expect(after.interpolation).toBe('CUBICSPLINE');
        expect(added).toBe(0);
        expect(after.times.length - inserted.length).toBe(track.times.length);
        const curve = playAs(after, 'as-written');
        for (let key = 0; key < track.times.length; key++)
          expect(
            angleBetween(curve.orientation([], track.times[key]), keyOrientation([], track, key)),
          ).toBeLessThan(1e-9);
        const spline = rotationSpline(track, { kind: 'c2' });
        for (const t of after.times.subarray(1, -1)) {
          const [before, later] = [t - 1e-7, t + 1e-7].map((at) => curve.rate([0, 0, 0], at, 'own'));
          const jump = Math.hypot(...before.map((rate, i) => rate - later[i]));
          // Rate continuous to 1 %, and to what 2e-7 s of acceleration make.
          expect(jump).toBeLessThan(0.01 * Math.hypot(...later) + 1e-3);
        }
        for (let i = 1; i < 60; i++) {
          const t = curve.start + (i / 60) * (curve.end - curve.start);
          expect(angleBetween(curve.orientation([], t), spline.orientation([], t)) * DEGREES).toBeLessThan(
            0.01,
          );
        }
      }),
      RUNS,
    );
  });

  it('refuses what has no corners to take, and a part of a track', () => {
    const [track] = fc.sample(
      dense.filter(({ interpolation }) => interpolation === 'CUBICSPLINE'),
      { numRuns: 1, seed: 1 },
    );
    expect(codeOf(() => through(track, {}))).toBe('step.one-mode');
    const [linear] = fc.sample(sparse, { numRuns: 1, seed: 1 });
    expect(codeOf(() => through(linear, { span: [0, 1] }))).toBe('step.one-mode');
  });
});

describe('whole turns', () => {
  it('turns by θ + 360·N with keys at most 120° apart; old keys stay to the bit', () => {
    fc.assert(
      fc.property(sparse, fc.integer({ min: -4, max: 5 }), (track, turns) => {
        const short = segmentAngle(track, 0) * DEGREES;
        fc.pre(short > 1);
        const { track: after, inserted } = applied(track, { verb: 'whole turns', keys: [1], turns });
        const curve = playAs(after, 'as-written');
        const angle = curve.length(track.times[0], track.times[1]) * DEGREES;
        expect(angle).toBeCloseTo(Math.abs(short + 360 * turns), 2);
        for (const key of inserted) expect(segmentAngle(after, key) * DEGREES).toBeLessThan(120.001);
      }),
      RUNS,
    );
  });

  it('needs an axis where both keys are alike, and turns about it', () => {
    const track = rotationTrack({ times: [0, 3], values: [0, 0, 0, 1, 0, 0, 0, 1] });
    expect(codeOf(() => applied(track, { verb: 'whole turns', keys: [1], turns: 3 }))).toBe(
      'step.needs-axis',
    );
    const { track: after } = applied(track, { verb: 'whole turns', keys: [1], turns: 3, axis: [0, 2, 0] });
    expect(travelled(after)).toBeCloseTo(1080, 6);
    const rate = playAs(after, 'as-written').rate([0, 0, 0], 1, 'own');
    expect(rate[1] * DEGREES).toBeCloseTo(360, 6);
    expect(codeOf(() => applied(track, { verb: 'whole turns', keys: [0], turns: 3, axis: [0, 1, 0] }))).toBe(
      'step.nothing-between',
    );
  });
});
