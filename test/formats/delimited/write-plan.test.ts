import { describe, expect, test } from 'vitest';
import {
  angleBetween,
  fromAxisAngle,
  keyOrientation,
  replaceTrack,
  type RotationTrack,
} from '@slewcurve/core';
import type { OpenOptions } from '@slewcurve/formats';
import { openText, rewritten, tracksOf } from '../../support/text-files.js';

const RADIANS = Math.PI / 180;
const SPACED = `# timestamp tx ty tz qx qy qz qw
1403636579763555584  1.5  2.50  -3  0.000000  0.000000  0.000000  1.000000
# the markers were lost
1403636579813555456  nan  nan  nan  nan  nan  nan  nan
1403636579863555328  1.5  2.50  -3  0.000000  0.000000  0.707107  0.707107
`.replace('timestamp', 'timestamp_ns');
const QUOTED =
  't;note;"qw";qx;qy;qz\r\n0.0;"a;b";"1.00";0.00;0.00;0.00\r\n0.5;"say ""x""";"1.00" ;0.00; 0;0.00;\r\n';
const ANGLES = 'time_s,rx_deg,ry_deg,rz_deg\n0.000,0,359.50,0\n0.010,0.25,361.00,0.125\n';

const tracks = async (text: string, table: OpenOptions['table'] = {}) =>
  tracksOf(await openText(text, 'a.csv', { table }));

function withNumber(track: RotationTrack, at: number, value: number): RotationTrack {
  const values = track.values.slice();
  values[at] = value;
  return replaceTrack(track, { values });
}

describe('writing delimited text', () => {
  test.each([
    ['spaces, comments, holes and nanoseconds', SPACED, {}],
    ['quotes, semicolons and CRLF', QUOTED, {}],
    ['angles', ANGLES, { euler: 'YXZ' }],
    ['no header', '0 0 0 0 1\n1 0 0 1 0', { columns: ['t', 'qx', 'qy', 'qz', 'qw'] }],
  ])('changes nothing where nothing changed: %s', async (_, text, table) => {
    expect(await rewritten(text, 'a.csv', [], { table })).toBe(text);
    expect(await rewritten(text, 'a.csv', await tracks(text, table), { table })).toBe(text);
  });

  test('changes the cells of one key alone; stamps keep their every digit', async () => {
    const [track] = await tracks(SPACED);
    const turned = withNumber(withNumber(track, 6, 0.6), 7, 0.8);
    expect(await rewritten(SPACED, 'a.csv', [turned])).toBe(
      SPACED.replace('0.707107  0.707107', '0.600000  0.800000'),
    );
  });

  test('finds a cell among quotes and other separators', async () => {
    const [track] = await tracks(QUOTED);
    expect(await rewritten(QUOTED, 'a.csv', [withNumber(track, 7, 0.25)])).toBe(
      QUOTED.replace('"1.00" ;', '"0.25" ;'),
    );
    expect(await rewritten(QUOTED, 'a.csv', [withNumber(track, 5, -0.5)])).toBe(
      QUOTED.replace('; 0;', '; -0.50;'),
    );
  });

  test('writes angles in their unit and leaves the angles beside alone', async () => {
    const [track] = await tracks(ANGLES, { euler: 'YXZ' });
    const changed = withNumber(track, 3, 721.126 * RADIANS);
    expect(await rewritten(ANGLES, 'a.csv', [changed], { table: { euler: 'YXZ' } })).toBe(
      ANGLES.replace('361.00', '721.13'),
    );
  });

  test('writes axis and angle near what stood there: the same side, the same whole turns', async () => {
    const text =
      't,ax,ay,az,angle_deg\n0,0.00000,0.00000,-1.00000,400.000\n1,0.00000,0.00000,1.00000,0.000\n';
    const [track] = await tracks(text);
    const values = track.values.slice();
    values.set(fromAxisAngle([0, 0, 0, 1], [0, 0, 1], -410 * RADIANS));
    expect(await rewritten(text, 'a.csv', [replaceTrack(track, { values })])).toBe(
      text.replace('400.000', '410.000'),
    );
  });

  test('writes a matrix with the scale that it has', async () => {
    const text =
      't,m00,m01,m02,m10,m11,m12,m20,m21,m22\n0,2.0000,0.0000,0,0.0000,2.0000,0,0,0,1\n1,1,0,0,0,1,0,0,0,1\n';
    const [track] = await tracks(text);
    const values = track.values.slice();
    values.set(fromAxisAngle([0, 0, 0, 1], [0, 0, 1], 90 * RADIANS));
    const made = await rewritten(text, 'a.csv', [replaceTrack(track, { values })]);
    expect(made.split('\n')[1].split(',').map(Number)).toEqual([0, 0, -2, 0, 2, 0, 0, 0, 0, 1]);
    expect(made.split('\n')[2]).toBe(text.split('\n')[2]);
    const [again] = await tracks(made);
    const turned = keyOrientation([0, 0, 0, 1], replaceTrack(track, { values }), 0);
    // Four decimals of cells that are whole.
    expect(angleBetween(keyOrientation([0, 0, 0, 1], again, 0), turned)).toBeLessThan(1e-12);
  });

  test('puts a number where a component was missing', async () => {
    const text = 't,qx,qy,qz,qw\n0,0.00,0.00,0.00,1.00\n1,0.00,nan,0.00,1.00\n';
    const [track] = await tracks(text);
    expect(await rewritten(text, 'a.csv', [withNumber(track, 5, 0.5)])).toBe(text.replace('nan', '0.50'));
  });

  test('refuses what the table cannot hold, and says why', async () => {
    const [track] = await tracks(SPACED);
    const refused = (changed: RotationTrack) => rewritten(SPACED, 'a.csv', [changed]);
    await expect(refused(replaceTrack(track, { times: [0, 1] }))).rejects.toMatchObject({
      code: 'delimited.fixed-rows',
    });
    await expect(refused(replaceTrack(track, { interpolation: 'STEP' }))).rejects.toMatchObject({
      code: 'plan.cannot-write',
    });
    await expect(refused(withNumber(track, 2, Infinity))).rejects.toMatchObject({
      code: 'plan.cannot-write',
      place: { key: 0 },
    });
    await expect(refused({ ...track, clip: 'Other' })).rejects.toMatchObject({ code: 'plan.unknown-track' });
    const [vane] = await tracks('t,rz_deg\n0,1\n1,2\n');
    await expect(rewritten('t,rz_deg\n0,1\n1,2\n', 'a.csv', [withNumber(vane, 4, 1)])).rejects.toMatchObject({
      code: 'delimited.fixed-columns',
    });
  });
});
