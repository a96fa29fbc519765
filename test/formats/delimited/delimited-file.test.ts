import { describe, expect, test } from 'vitest';
import {
  angleBetween,
  fromEuler,
  keyOrientation,
  measure,
  playAs,
  type RotationTrack,
} from '@slewcurve/core';
import { openText, tracksOf } from '../../support/text-files.js';
import type { OpenOptions } from '@slewcurve/formats';

const RADIANS = Math.PI / 180;
const open = (text: string, table: OpenOptions['table'] = {}, name = 'head.csv') =>
  openText(text, name, { table });
const refused = async (text: string, table: OpenOptions['table'] = {}): Promise<unknown> =>
  open(text, table).catch((error: unknown) => error);
const first = async (text: string, table: OpenOptions['table'] = {}): Promise<RotationTrack> =>
  tracksOf(await open(text, table))[0];

// 0, 30 and 60 degrees about z, 1/60 s apart.
const TURNS = [
  [0, 0, 0, 1],
  [0, 0, Math.sin(Math.PI / 12), Math.cos(Math.PI / 12)],
  [0, 0, 0.5, Math.cos(Math.PI / 6)],
].map((quaternion) => quaternion.map((part) => part.toFixed(9)));
const table = (header: string, rows: (key: number) => readonly string[], separator = ','): string =>
  `${header}\n${TURNS.map((_, key) => [(key / 60).toFixed(6), ...rows(key)].join(separator)).join('\n')}\n`;
const xyzw = table('t,qx,qy,qz,qw', (key) => TURNS[key]);

const peak = async (text: string, euler?: string) =>
  measure(playAs(await first(text, euler === undefined ? {} : { euler, unit: 'deg' }), 'short-way')).peakRate;

const lined = (columns: readonly (readonly number[])[]): string =>
  columns.map((numbers, key) => [key / 60, ...numbers].join(',')).join('\n');

const message = async (text: string, options: OpenOptions['table'] = {}) => {
  const error = await refused(text, options);
  expect(error).toMatchObject({
    name: 'SlewcurveError',
    code: 'delimited.unnamed-columns',
    place: { file: 'head.csv' },
  });
  return String(error);
};

const order =
  (...parts: number[]) =>
  (key: number) =>
    parts.map((part) => TURNS[key][part]);

const cells = (from: number) =>
  [0, 1, 2].flatMap((row) => [0, 1, 2].map((column) => `${row + from}${column + from}`));

const timesOf = async (name: string, ...stamps: string[]) => [
  ...(await first(`${name},qx,qy,qz,qw\n${stamps.map((stamp) => `${stamp},0,0,0,1\n`).join('')}`)).times,
];

const still = (times: readonly number[]): string =>
  `t,qx,qy,qz,qw\n${times.map((time) => `${time},0,0,0,1\n`).join('')}`;

describe('delimited text', () => {
  test('is one clip with a track for every body', async () => {
    const file = await open(xyzw);
    expect(file).toMatchObject({
      format: 'delimited',
      problems: [],
      nodes: [{ path: 'rotation', parent: -1 }],
    });
    expect(file.clips).toMatchObject([
      { name: 'table', index: 0, start: 0, end: 0.033333, frameRate: 60, loop: false },
    ]);
    const [track] = tracksOf(file);
    expect(track).toMatchObject({
      id: 'rotation',
      interpolation: 'LINEAR',
      breaks: [],
      storage: { component: 'text', decimals: 9, timeComponent: 'text', timeDecimals: 6 },
    });
    expect([...track.values]).toEqual(TURNS.flat().map(Number));
  });

  test('goes by the names of components, never by their places (NEEDS A24)', async () => {
    const [x, y, z, w] = [0, 1, 2, 3];
    const same = [
      table('time,w,x,y,z', order(w, x, y, z)),
      table('timestamp,x,y,z,w', order(x, y, z, w)),
      table('time_s,qw,qz,qy,qx', order(w, z, y, x)),
      table('t,q_x,q_y,q_z,q_w', order(x, y, z, w)),
      table('T,QX,QY,QZ,QW', order(x, y, z, w)),
      table('#timestamp [s],q_RS_w [],q_RS_x [],q_RS_y [],q_RS_z []', order(w, x, y, z)),
    ];
    const { values } = await first(xyzw);
    for (const text of same) expect((await first(text)).values).toEqual(values);
  });

  test.each([
    ['commas', ','],
    ['semicolons', ';'],
    ['tabs', '\t'],
    ['spaces', ' '],
    ['runs of spaces and tabs', '  \t '],
  ])('is split at %s', async (_, separator) => {
    const text = table(['t', 'qx', 'qy', 'qz', 'qw'].join(separator), (key) => TURNS[key], separator);
    const { values, times } = await first(xyzw);
    expect(await first(text)).toMatchObject({ values, times });
    expect(await first(text.replaceAll('\n', '\r\n'))).toMatchObject({ values, times });
    expect(await first(`\uFEFF${text.trimEnd()}`)).toMatchObject({ values, times });
  });

  test('reads quotes, comments, empty lines and a separator at the end of rows', async () => {
    const quoted = `# a head\n"t","qx","qy","qz","qw","note"\n\n"0.0","0","0","0","1","still, ""so"""\n# amid\n0.5,0,0,1,0,moved\n`;
    expect((await first(quoted)).values).toEqual(Float64Array.of(0, 0, 0, 1, 0, 0, 1, 0));
    expect((await first('t,qx,qy,qz,qw\n0,0,0,0,1,\n1,0,0,1,0,\n')).times).toEqual(Float64Array.of(0, 1));
  });

  test('takes names from a comment: timestamp tx ty tz qx qy qz qw', async () => {
    const text = '# ground truth\n# timestamp tx ty tz qx qy qz qw\n1.5 9 8 7 0 0 0 1\n2.5 9 8 7 0 0 1 0\n';
    expect(await first(text)).toMatchObject({
      times: Float64Array.of(1.5, 2.5),
      values: Float64Array.of(0, 0, 0, 1, 0, 0, 1, 0),
    });
    const position = '# time x y z qx qy qz qw\n1.5 9 8 7 0 0 0 1\n2.5 9 8 7 0 0 1 0\n';
    expect((await first(position)).values).toEqual(Float64Array.of(0, 0, 0, 1, 0, 0, 1, 0));
  });

  test('reads one body for every name before the components', async () => {
    const text = 'time,head_qx,head_qy,head_qz,head_qw,left hand.rx_deg\n0,0,0,0,1,10\n0.1,0,0,1,0,20\n';
    const file = await open(text);
    expect(tracksOf(file).map(({ id, interpolation, sequence }) => [id, interpolation, sequence])).toEqual([
      ['head', 'LINEAR', undefined],
      ['left hand', 'EULER', 'XYZ'],
    ]);
  });

  test('reads Euler degrees and radians with a named sequence, turns kept (NEEDS A3)', async () => {
    const degrees = 'time_s,rx_deg,ry_deg,rz_deg\n0,1,2,3\n1,4,365,-270\n';
    const track = await first(degrees, { euler: 'YXZ' });
    expect(track).toMatchObject({ interpolation: 'EULER', sequence: 'YXZ' });
    const inDegrees = [...track.values].map((x) => Number((x / RADIANS).toPrecision(12)));
    expect(inDegrees).toEqual([2, 1, 3, 365, 4, -270]);
    const radians = await first('t,rx_rad,ry_rad,rz_rad\n0,1,2,3\n1,4,5,6\n', { euler: 'zyx' });
    expect(radians).toMatchObject({ sequence: 'zyx', values: Float64Array.of(3, 2, 1, 6, 5, 4) });
    const asked = await first('t,rx,ry,rz\n0,1,2,3\n1,4,5,6\n', { euler: 'XYZ', unit: 'rad' });
    expect(asked.values).toEqual(Float64Array.of(1, 2, 3, 4, 5, 6));
    const proper = await first('t,r1,r2,r3\n0,1,2,3\n1,4,5,6\n', { euler: 'ZXZ', unit: 'rad' });
    expect(proper).toMatchObject({ sequence: 'ZXZ', values: Float64Array.of(1, 2, 3, 4, 5, 6) });
    const wheel = await first('t,rz_deg\n0,0\n2,360\n');
    const turned = measure(playAs(wheel, 'as-written'));
    expect(turned.travelled / RADIANS).toBeCloseTo(360, 9);
    expect(turned.peakRate / RADIANS).toBeCloseTo(180, 9);
  });

  test('reads axis and angle, and 3x3 matrices counted from 0 or 1, as the same turns', async () => {
    const about = [1, 2, 2].map((part) => part / 3);
    const angles = [0, 40, 200];
    const quaternion = (degrees: number): number[] => [
      ...about.map((part) => part * Math.sin((degrees / 2) * RADIANS)),
      Math.cos((degrees / 2) * RADIANS),
    ];
    const axis = `t,ax,ay,az,angle_deg\n${angles.map((angle, key) => [key, ...about, angle].join(',')).join('\n')}\n`;
    const matrixOf = (degrees: number): number[][] => {
      const [x, y, z, w] = quaternion(degrees);
      return [
        [1 - 2 * (y * y + z * z), 2 * (x * y - z * w), 2 * (x * z + y * w)],
        [2 * (x * y + z * w), 1 - 2 * (x * x + z * z), 2 * (y * z - x * w)],
        [2 * (x * z - y * w), 2 * (y * z + x * w), 1 - 2 * (x * x + y * y)],
      ];
    };
    const matrix = (letter: string, from: number): string =>
      `t,${cells(from)
        .map((cell) => letter + cell)
        .join(',')}\n${angles.map((angle, key) => [key, ...matrixOf(angle).flat()].join(',')).join('\n')}\n`;
    for (const text of [axis, matrix('m', 0), matrix('r', 1), axis.replace('angle_deg', 'angle')]) {
      const track = await first(text, { ...(text.includes('angle\n') && { unit: 'deg' as const }) });
      // Rounding of float64 in the conversions.
      angles.forEach((angle, key) =>
        expect(angleBetween(keyOrientation([0, 0, 0, 1], track, key), quaternion(angle))).toBeLessThan(1e-14),
      );
    }
  });

  test('tells a matrix that is no rotation', async () => {
    const names = 't,m00,m01,m02,m10,m11,m12,m20,m21,m22';
    const reflected = await first(`${names}\n0,-1,0,0,0,1,0,0,0,1\n1,1,0,0,0,1,0,0,0,1\n`);
    expect([...reflected.source.matrices!.reflected]).toEqual([1, 0]);
    const sheared = await first(`${names}\n0,1,0,0.5,0,1,0,0,0,1\n1,1,0,0,0,1,0,0,0,1\n`);
    expect([...sheared.source.matrices!.reflected]).toEqual([0, 0]);
    // The cosine between (1, 0, 0) and (0.5, 0, 1).
    expect(sheared.source.matrices!.shear[0]).toBeCloseTo(0.5 / Math.hypot(0.5, 1), 15);
    expect(sheared.source.matrices!.shear[1]).toBe(0);
  });

  test('reads stamps in every unit, to the nearest float64', async () => {
    expect(await timesOf('time_ms', '100', '133.3')).toEqual([0.1, 0.1333]);
    expect(await timesOf('timestamp_us', '1', '3')).toEqual([1e-6, 3e-6]);
    expect(await timesOf('timestamp_ns', '100', '300')).toEqual([1e-7, 3e-7]);
    expect(await timesOf('timestamp [ns]', '-5', '7')).toEqual([-5e-9, 7e-9]);
    expect(await timesOf('t', '1311868164.363181', '1311868164.399026')).toEqual([
      1311868164.363181, 1311868164.399026,
    ]);
    expect(await timesOf('t', '1e-3', '.5E1', '+7')).toEqual([0.001, 5, 7]);
  });

  test('keeps nanoseconds above 2^53: differences lose nothing', async () => {
    const stamps = [1403636579763555584n, 1403636579763555585n, 1403636579813555456n, 1403636999999999999n];
    const file = await open(
      `timestamp_ns,qx,qy,qz,qw\n${stamps.map((stamp) => `${stamp},0,0,0,1\n`).join('')}`,
    );
    expect(file.problems).toMatchObject([{ code: 'delimited.epoch' }]);
    expect(file.problems[0].message).toContain('after 1403636579 s');
    const [{ times, storage }] = tracksOf(file);
    expect([...times]).toEqual(['0.763555584', '0.763555585', '0.813555456', '420.999999999'].map(Number));
    expect(storage.timeDecimals).toBe(9);
    const seconds = await first(
      `t,qx,qy,qz,qw\n1.403636579763555527e+09,0,0,0,1\n1403636580,0,0,0,1\n1403636580.763555527,0,0,0,1\n`,
    );
    expect([...seconds.times]).toEqual([0.763555527, 1, 1.763555527]);
  });

  test('takes rows of nan, and empty ones, as declared holes: no key, and nothing across', async () => {
    const text =
      't,qx,qy,qz,qw\n0,nan,nan,nan,nan\n1,0,0,0,1\n2,NaN,NaN,NaN,NaN\n3,,,,\n4,0,0,1,0\n5,0,0,1,0\n6,-,-,-,-\n';
    expect(await first(text)).toMatchObject({ times: Float64Array.of(1, 4, 5), breaks: [0, 2] });
  });

  test('keeps a row that lacks one component, so that a rule can report it', async () => {
    const track = await first('t,qx,qy,qz,qw\n0,0,0,0,1\n1,0,nan,0,1\n2,inf,0,0,1\n');
    expect([...track.values]).toEqual([0, 0, 0, 1, 0, NaN, 0, 1, Infinity, 0, 0, 1]);
  });

  test('takes a long gap in a capture as a hole, and leaves keys set by hand alone', async () => {
    expect((await first(still([0, 0.01, 0.02, 0.05, 0.06]))).breaks).toEqual([2]);
    expect((await first(still([0, 1, 2, 9, 10]))).breaks).toEqual([]);
  });

  test('refuses what is not named, with what is missing (NEEDS A24)', async () => {
    expect(await message('0,0,0,0,1\n1,0,0,1,0\n')).toMatch(
      /line 1: the rows have 5 columns and no header names them.*--columns/,
    );
    expect(await message('t,qx,qy,qz\n0,0,0,0\n')).toContain('leave out qw.');
    expect(await message('t,w,x,y\n0,0,0,0\n')).toContain('leave out z.');
    expect(await message('frame,qx,qy,qz,qw\n0,0,0,0,1\n')).toContain('leave out the time');
    expect(await message('t,x,y,z\n0,0,0,0\n')).toContain('leave out an orientation');
    expect(await message('t,rx_deg,ry_deg,rz_deg\n0,0,0,0\n')).toContain(
      'leave out the sequence of the angles',
    );
    expect(await message('t,rx,ry,rz\n0,0,0,0\n')).toContain(
      'the sequence of the angles (such as YXZ) and the unit',
    );
    expect(await message('t,rx_deg,ry_deg,rz_deg\n0,0,0,0\n', { euler: 'ZXZ' })).toContain(
      'angles that fit ZXZ',
    );
    expect(await message('t,ax,ay,az,angle\n0,0,0,0,1\n')).toContain('the unit of the angle');
  });

  test('opens what names no column once the options do', async () => {
    const bare = '0 9 9 9 0 0 0 1\n1 9 9 9 0 0 1 0\n';
    const columns = ['timestamp', 'tx', 'ty', 'tz', 'qx', 'qy', 'qz', 'qw'];
    expect((await first(bare, { columns })).values).toEqual(Float64Array.of(0, 0, 0, 1, 0, 0, 1, 0));
    expect(await refused(bare, { columns: columns.slice(1) })).toMatchObject({
      code: 'delimited.column-count',
    });
    expect(String(await refused(bare, { columns: columns.slice(1) }))).toContain(
      'has 8 cells and 7 columns are named',
    );
  });

  test.each([
    [
      'a header that names more than the rows have',
      't,qx,qy,qz,qw,note\n0,0,0,0,1\n1,0,0,1,0\n',
      'delimited.row-length',
      2,
    ],
    ['a row that is too long', 't,qx,qy,qz,qw\n0,0,0,0,1\n1,0,0,1,0,3\n', 'delimited.row-length', 3],
    ['a word for a number', 't,qx,qy,qz,qw\n0,0,0,0,1\n1,0,one,1,0\n', 'delimited.bad-number', 3],
    ['a decimal comma', 't;qx;qy;qz;qw\n0;0;0;0;1\n1;0;0,5;1;0\n', 'delimited.bad-number', 3],
    ['a word for a time', 't,qx,qy,qz,qw\n0,0,0,0,1\nsoon,0,0,1,0\n', 'delimited.bad-time', 3],
    [
      'nanoseconds under a name without a unit',
      'timestamp,qx,qy,qz,qw\n1403636579763555584,0,0,0,1\n',
      'delimited.time-unit',
      2,
    ],
    ['a quote that is not closed', 't,qx,qy,qz,qw\n0,0,0,0,"1\n1,0,0,1,0\n', 'delimited.bad-quotes', 2],
    ['a name that is there twice', 't,qx,qy,qz,qw,qx\n0,0,0,0,1,0\n', 'delimited.doubled-column', 1],
    ['two times', 't,time_ns,qx,qy,qz,qw\n0,0,0,0,1,0\n', 'delimited.doubled-column', 1],
    ['words alone', 'the quick brown fox\njumps\n', 'delimited.no-rows', undefined],
  ])('names %s with its line', async (_, text, code, line) => {
    expect(await refused(text)).toMatchObject({
      name: 'SlewcurveError',
      code,
      place: { file: 'head.csv', ...(line !== undefined && { line }) },
    });
  });

  test('gives both numbers where a header disagrees with its rows', async () => {
    expect(String(await refused('t,qx,qy,qz,qw,note\n0,0,0,0,1\n1,0,0,1,0\n'))).toContain(
      'the row has 5 cells and the header names 6',
    );
    const cut = await open('t,qx,qy,qz,qw\n0,0,0,0,1\n1,0,0,1');
    expect(cut.problems).toMatchObject([{ code: 'delimited.cut-row', place: { line: 3 } }]);
    expect(cut.problems[0].message).toContain('has 4 cells and the header names 5');
    expect(tracksOf(cut)[0].times).toHaveLength(1);
  });

  test('says where units conflict, and where an orientation stands twice', async () => {
    expect(await refused('t,rx_deg,ry_deg,rz_deg\n0,0,0,0\n', { euler: 'XYZ', unit: 'rad' })).toMatchObject({
      code: 'delimited.unit-conflict',
    });
    expect(await refused('t,rx_deg,ry_deg,rz_deg\n0,0,0,0\n', { euler: 'XXY' })).toMatchObject({
      code: 'euler.unknown-sequence',
      place: { file: 'head.csv' },
    });
    const file = await open('t,qx,qy,qz,qw,rx_deg,ry_deg,rz_deg\n0,0,0,0,1,0,0,0\n');
    expect(file.problems).toMatchObject([{ code: 'delimited.two-forms' }]);
    expect(tracksOf(file)).toHaveLength(1);
  });

  test('reads a smooth turn written in each of the twelve orders as the same speeds (NEEDS A16)', async () => {
    const { EULER_SEQUENCES, toEuler, unwrapEuler } = await import('@slewcurve/core');
    const keys = 240;
    const motion = Array.from({ length: keys }, (_, key) => {
      const t = key / 60;
      return fromEuler(
        [0, 0, 0, 1],
        [0.9 * Math.sin(1.1 * t), 0.4 * Math.cos(0.7 * t), 2 * Math.sin(0.5 * t + 1)],
        'YXZ',
      );
    });
    const own = await peak(`t,qx,qy,qz,qw\n${lined(motion)}\n`);
    for (const sequence of EULER_SEQUENCES.slice(0, 12)) {
      const angles = motion.flatMap((q) => [...toEuler([0, 0, 0], q, sequence)]);
      const degrees = [...unwrapEuler(Float64Array.from(angles), angles, sequence)].map((x) => x / RADIANS);
      const text = `t,r1,r2,r3\n${lined(motion.map((_, key) => degrees.slice(3 * key, 3 * key + 3)))}\n`;
      // The need asks for 1e-4; full decimals leave float64 rounding, 57 times and more of it near a pole.
      expect(Math.abs((await peak(text, sequence)) / own - 1)).toBeLessThan(1e-9);
    }
  });
});
