import { describe, expect, it } from 'vitest';
import { CAMERA, flight, pointingError, samplerOf } from '../support/camera-flight.js';
import { codeOf } from '../support/edit-acceptance.js';
import { measured } from '../support/measured.js';
import { mend } from '../support/mended.js';

describe('a camera whose place and aim are both keyed', () => {
  it.each(['LINEAR', 'CUBICSPLINE'] as const)(
    'keeps pointing at its target through paces, its place %s',
    async (mode) => {
      const bytes = flight(mode);
      const before = await pointingError(bytes);
      for (const step of [
        { verb: 'even out' },
        { verb: 'even out', store: 'move' },
        { verb: 'cap', rate: 12 },
        { verb: 'stretch', seconds: 7 },
        // On the frames the aim eases inside the first old gap, where a place whose keys travel runs evenly: 0.15° here. Moved keys stay in step.
        { verb: 'ease in/out', shoulders: 0.8, store: 'move' },
        { verb: 'reverse' },
        { verb: 'there and back' },
      ] as const) {
        const { bytes: made } = await mend(bytes, { ...CAMERA, ...step });
        const after = await pointingError(made);
        measured(
          `${mode}, ${step.verb}: pointing error ${before.toFixed(4)}° before, ${after.toFixed(4)}° after`,
        );
        expect(after - before).toBeLessThanOrEqual(0.05);
      }
    },
  );

  it('taken along alone, its place stays to the bit', async () => {
    const bytes = flight();
    const { bytes: made } = await mend(bytes, { ...CAMERA, verb: 'stretch', seconds: 8, with: 'track' });
    expect(samplerOf(made, 1)).toEqual(samplerOf(bytes, 1));
    expect(samplerOf(made, 0).times.at(-1)).toBe(8);
  });

  it('takes its node along and nothing else, or the whole clip', async () => {
    const bytes = flight();
    const step = { ...CAMERA, verb: 'stretch', seconds: 8 };
    const { bytes: node } = await mend(bytes, step);
    expect([0, 1, 2, 3].map((channel) => samplerOf(node, channel).times.at(-1))).toEqual([8, 8, 4, 4]);
    const { bytes: clip, steps } = await mend(bytes, { ...step, with: 'clip' });
    expect([0, 1, 2, 3].map((channel) => samplerOf(clip, channel).times.at(-1))).toEqual([8, 8, 8, 8]);
    for (const channel of [0, 1, 2, 3])
      expect(samplerOf(clip, channel).values).toEqual(samplerOf(bytes, channel).values);
    expect(steps[0].price?.seconds).toBe(4);
    expect(steps[0].outside).toBeLessThan(1e-7);
  });

  it('composes paces one after the other', async () => {
    const bytes = flight();
    const { bytes: made } = await mend(
      bytes,
      { ...CAMERA, verb: 'cap', rate: 12 },
      { ...CAMERA, verb: 'hold', at: 2, seconds: 1 },
      { ...CAMERA, verb: 'stretch', seconds: 12 },
    );
    expect(samplerOf(made, 1).times.at(-1)).toBeCloseTo(12, 5);
    expect(samplerOf(made, 1).values).toEqual(samplerOf(bytes, 1).values);
  });

  it('refuses to put a clip on the clocks of two tracks', async () => {
    const bytes = flight();
    const run = mend(bytes, { clip: 'Flight', track: '*', verb: 'stretch', seconds: 8, with: 'clip' });
    const error: unknown = await run.catch((thrown: unknown) => thrown);
    expect(
      codeOf(() => {
        throw error;
      }),
    ).toBe('step.many-clocks');
  });
});
