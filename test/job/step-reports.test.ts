import { buildReport, textReport } from '@slewcurve/job';
import { describe, expect, it } from 'vitest';
import { flight, CAMERA } from '../support/camera-flight.js';
import { type GltfJson, Packer, glb } from '../support/gltf-bytes.js';
import { type Made, SETTINGS, mend } from '../support/mended.js';

function text(made: Made): string {
  return textReport(buildReport([made.report], SETTINGS, { steps: made.steps }));
}

describe('what a pace costs', () => {
  it('stands in every step report: seconds, degrees, bytes; bends, corners and joins where there are any', async () => {
    const made = await mend(
      flight(),
      { ...CAMERA, verb: 'even out' },
      { ...CAMERA, verb: 'match', at: 2, meet: 8 },
      { clip: 'Flight', track: 'boat', verb: 'lift out', keys: [3] },
    );
    for (const { price } of made.steps)
      expect(Object.keys(price ?? {})).toEqual(['seconds', 'degrees', 'bytes']);
    expect(made.steps[1].meeting?.before).toBeCloseTo(8, 1);
    expect(made.steps[0].bends).toEqual([]);
    // The pace of even speed is no bend, and lifting a key out no pace.
    expect(made.steps[2].bends).toBeUndefined();
    const report = textReport(buildReport([made.report], SETTINGS, { steps: made.steps }));
    expect(report).toMatch(
      /Even out all keys of camera in Flight\..* s added; as stored up to .*° off; 0 bytes more\./,
    );
    expect(report).toContain('Both sides turn at 8.00 and 8.00 deg/s now, about axes');
  });

  it('warns of bends that are taken fast', async () => {
    const bytes = cornered();
    const step = { clip: 'Turn', track: 'head', verb: 'cap', rate: 40 };
    const { steps } = await mend(bytes, step);
    // 90° about y, then 90° about x, both at 40 deg/s: v·|Δn| = 40·√2 = 56.6 deg/s.
    expect(steps[0].bends?.[0]?.jump).toBeCloseTo(56.57, 1);
    const rounded = await mend(bytes, { ...step, acceleration: 60 });
    expect(rounded.steps[0].price?.rounded).toBeCloseTo(0.1, 6);
    expect(text(rounded)).toContain('corners rounded by up to 0.10°');
    expect(text(await mend(bytes, step))).toContain(
      'Bends taken fast, where the rate changes at once: 56.6 deg/s at',
    );
  });
});

/** A head that turns by 90° about y in 1 s, then about x in 1 s. */
function cornered(): Uint8Array {
  const packer = new Packer();
  const half = Math.SQRT1_2;
  const input = packer.add('SCALAR', [0, 1, 2]);
  const output = packer.add('VEC4', [0, 0, 0, 1, 0, half, 0, half, 0.5, 0.5, -0.5, 0.5]);
  const json: GltfJson = {
    ...packer.json,
    nodes: [{ name: 'head' }],
    animations: [
      {
        name: 'Turn',
        samplers: [{ input, output }],
        channels: [{ sampler: 0, target: { node: 0, path: 'rotation' } }],
      },
    ],
  };
  return glb(json, packer.data);
}
