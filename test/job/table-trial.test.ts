import { bufferSource } from '@slewcurve/formats';
import { desk, tryTable, UNWATCHED } from '@slewcurve/job';
import { NO_HOUSE_RULES } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';

const TEXT = `t,rx,ry,rz\n${Array.from({ length: 31 }, (_, i) => `${i / 30},0,${2 * i},0`).join('\n')}\n`;
const source = bufferSource(new TextEncoder().encode(TEXT));
const SETTINGS = {
  playbacks: ['as-written'],
  failAt: 'warning',
  allowWarnings: 0,
  houseRules: NO_HOUSE_RULES,
} as const;

describe('a table that does not say all of itself', () => {
  test('asks for what is open, and shows what each answer makes of it', async () => {
    expect(await tryTable(source, 'pan.csv')).toMatchObject({ silent: ['euler', 'unit'], tracks: [] });
    const degrees = await tryTable(source, 'pan.csv', { euler: 'YXZ', unit: 'deg' });
    expect(degrees).toMatchObject({ silent: [], tracks: [{ keys: 31 }] });
    // 2 degrees a frame at 30 a second.
    expect(degrees.tracks[0].peakRate).toBeCloseTo(60, 3);
    const radians = await tryTable(source, 'pan.csv', { euler: 'YXZ', unit: 'rad' });
    expect(radians.tracks[0].peakRate).toBeCloseTo((60 * 180) / Math.PI, 0);
  });

  test('says why an answer does not fit', async () => {
    const { problem } = await tryTable(source, 'pan.csv', {
      columns: ['t', 'rx', 'rx', 'rz'],
      euler: 'XYZ',
      unit: 'deg',
    });
    expect(problem?.code).toBe('delimited.doubled-column');
  });

  test('opens on the desk by what was said, and the report says who said it', async () => {
    const here = desk();
    await expect(here.open('a', source, 'pan.csv')).rejects.toThrow('leave out');
    const said = { table: { euler: 'YXZ', unit: 'deg' }, up: '+z' } as const;
    const opened = await here.open('a', source, 'pan.csv', undefined, said);
    expect(opened.conventions).toContainEqual({ what: 'angle unit', is: 'degrees', toldBy: 'you' });
    const report = await here.survey('a', SETTINGS, UNWATCHED, () => {});
    expect(report.conventions).toContainEqual({ what: 'up axis', is: '+z', toldBy: 'you' });
    const matrix = here.matrix('a', 'table', 'rotation', { ticks: [30], reading: 'own' });
    expect(matrix.cells.map(({ playback }) => playback)).toContain('euler-linear');
    // What is saved is read back by the same answers.
    const bytes = await here.bytes('a', UNWATCHED);
    expect(new TextDecoder().decode(bytes.bytes)).toBe(TEXT);
  });
});
