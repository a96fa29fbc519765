import { SlewcurveError } from '@slewcurve/core';
import { bufferSource, lookAtTable } from '@slewcurve/formats';
import { describe, expect, test } from 'vitest';

const look = (text: string, options?: Parameters<typeof lookAtTable>[2]) =>
  lookAtTable(bufferSource(new TextEncoder().encode(text)), 'take.csv', options);

const ROWS = '0,10,20,30\n0.1,11,21,31\n0.2,12,22,32\n';

describe('lookAtTable', () => {
  test.each([
    ['t,qx,qy,qz,qw\n0,0,0,0,1\n', {}, []],
    ['0,0,0,0,1\n0.1,0,0,0,1\n', {}, ['columns']],
    ['0,0,0,0,1\n0.1,0,0,0,1\n', { columns: ['t', 'qx', 'qy', 'qz', 'qw'] }, []],
    ['a,b,c\n0,1,2\n', {}, ['columns']],
    ['qx,qy,qz,qw\n0,0,0,1\n', {}, ['columns']],
    [`t,rx,ry,rz\n${ROWS}`, {}, ['euler', 'unit']],
    [`t,rx,ry,rz\n${ROWS}`, { euler: 'YXZ' }, ['unit']],
    [`t,rx,ry,rz\n${ROWS}`, { euler: 'YXZ', unit: 'deg' as const }, []],
    [`t,rx_deg,ry_deg,rz_deg\n${ROWS}`, {}, ['euler']],
    ['t,ry_rad\n0,1\n', {}, []],
    ['t,ry\n0,1\n', {}, ['unit']],
    ['t,ax,ay,az,angle\n0,0,1,0,2\n', {}, ['unit']],
    ['# timestamp tx ty tz qx qy qz qw\n0 1 2 3 0 0 0 1\n', {}, []],
  ])('of %j with %j says that %j is to be told', async (text, options, silent) => {
    expect((await look(text, options)).silent).toEqual(silent);
  });

  test('shows the names and the first five rows as they stand', async () => {
    const rows = Array.from({ length: 40 }, (_, i) => `${i}; 0.50 ;"x"`).join('\n');
    const seen = await look(`t;rx;note\n# a comment\n${rows}`);
    expect(seen.names).toEqual(['t', 'rx', 'note']);
    expect(seen.rows).toEqual([0, 1, 2, 3, 4].map((i) => [String(i), '0.50', 'x']));
  });

  test('refuses prose', async () => {
    await expect(look('once upon\na time\n')).rejects.toThrow(SlewcurveError);
  });
});
