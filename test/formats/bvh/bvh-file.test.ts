import { describe, expect, test } from 'vitest';
import {
  angleBetween,
  EULER_SEQUENCES,
  fromEuler,
  measure,
  playAs,
  segmentAngle,
  toEuler,
  unwrapEuler,
} from '@slewcurve/core';
import { surveyClip } from '@slewcurve/survey';
import { BOOM } from '../../support/bvh-text.js';
import { seededRandom } from '../../support/seeded-random.js';
import { openText, tracksOf } from '../../support/text-files.js';

const RADIANS = Math.PI / 180;
const open = (text: string | Uint8Array) => openText(text, 'boom.bvh');
const oneJoint = (channels: string, rows: readonly string[], frameTime = '0.1', frames = `${rows.length}`) =>
  `HIERARCHY\nROOT Vane\n{\nOFFSET 0 0 0\nCHANNELS ${channels}\n}\nMOTION\nFrames: ${frames}\nFrame Time: ${frameTime}\n${rows.join('\n')}\n`;

const degrees = (values: Float64Array) => [...values].map((x) => Number((x / RADIANS).toPrecision(12)));

describe('a BVH file', () => {
  test('is one clip of EULER tracks, a sequence for every joint from its channels', async () => {
    const file = await open(BOOM);
    expect(file).toMatchObject({ format: 'bvh', problems: [] });
    expect(file.clips).toHaveLength(1);
    expect(file.clips[0]).toMatchObject({ name: 'MOTION', start: 0, end: 0.08, frameRate: 25, loop: false });
    expect(tracksOf(file).map(({ id, sequence, interpolation }) => [id, sequence, interpolation])).toEqual([
      ['Mast', 'ZXY', 'EULER'],
      ['Mast/Long Boom', 'YXZ', 'EULER'],
      ['Mast/Winch', 'XYZ', 'EULER'],
    ]);
  });

  test('keeps turns: angles past 180 degrees stay as written', async () => {
    const [mast, boom, winch] = tracksOf(await open(BOOM));
    expect(degrees(mast.values)).toEqual([0, 10, -5.5, 12, 200, 5.5, 24, 390, 0]);
    expect(degrees(boom.values)).toEqual([350, 0, -0.25, 370, 0, -0.125, 380, 0, 0.5]);
    expect(degrees(winch.values)).toEqual([-1080, 0, 0, -45, 0, 0, 100, 0, 0]);
  });

  test('gives the node tree with its offsets, end sites too', async () => {
    const { nodes } = await open(BOOM);
    expect(
      nodes.map(({ path, parent, translation, joint }) => ({ path, parent, translation, joint })),
    ).toEqual([
      { path: 'Mast', parent: -1, translation: [0, 1.5, 0], joint: true },
      { path: 'Mast/Long Boom', parent: 0, translation: [0, 4, 0.25], joint: true },
      { path: 'Mast/Long Boom/End Site', parent: 1, translation: [0, 0, 9], joint: false },
      { path: 'Mast/Winch', parent: 0, translation: [-1, 0, 0], joint: true },
    ]);
  });

  test('tells how many decimals its numbers have: the noise floor comes from that', async () => {
    const decimals = tracksOf(await open(BOOM)).map(({ storage }) => storage.decimals);
    expect(decimals).toEqual([3, 3, 1]);
    expect(tracksOf(await open(BOOM))[0].storage).toMatchObject({ timeComponent: 'text', timeDecimals: 2 });
  });

  test.each([
    ['CRLF', BOOM.replaceAll('\n', '\r\n')],
    ['CR alone', BOOM.replaceAll('\n', '\r')],
    ['a byte order mark', `\uFEFF${BOOM}`],
    [
      'keywords in lower case',
      BOOM.replaceAll(
        /HIERARCHY|ROOT|JOINT|OFFSET|CHANNELS|MOTION|Frames|Frame Time|End Site|rotation|position/g,
        (word) => word.toLowerCase(),
      ),
    ],
    [
      'several statements on a line',
      BOOM.replace('ROOT Mast\n{\n\tOFFSET 0.00 1.50 0.00\n', 'ROOT Mast { OFFSET 0.00 1.50 0.00 '),
    ],
    ['empty lines and no last line end', BOOM.replace('MOTION', '\n\nMOTION\n').trimEnd()],
  ])('reads the same with %s', async (_, text) => {
    const same = await open(text);
    const plain = await open(BOOM);
    expect(same.problems).toEqual([]);
    expect(same.nodes).toEqual(plain.nodes);
    expect(tracksOf(same).map(({ id, values }) => [id, values])).toEqual(
      tracksOf(plain).map(({ id, values }) => [id, values]),
    );
  });

  test('reads names that are not ASCII', async () => {
    const [track] = tracksOf(
      await open(oneJoint('1 Zrotation', ['1', '2']).replace('Vane', 'Wetterhahn-Süd')),
    );
    expect(track.id).toBe('Wetterhahn-Süd');
  });

  test('takes the rest pose of row 0 as a key like any other', async () => {
    const [track] = tracksOf(await open(oneJoint('1 Zrotation', ['0', '90', '91'])));
    expect(track.times).toHaveLength(3);
    // 90 degrees in 0.1 s; 1e-9 is float64 rounding of 900 deg/s.
    expect(measure(playAs(track, 'as-written')).peakRate / RADIANS).toBeCloseTo(900, 9);
  });

  test('counts a turn of 360 degrees as 360 degrees travelled, and -270 as -270', async () => {
    // NEEDS A3. The bound is float64 rounding.
    const [wheel] = tracksOf(
      await open(oneJoint('3 Zrotation Xrotation Yrotation', ['0 0 0', '360 0 0'], '2')),
    );
    const turned = measure(playAs(wheel, 'as-written'));
    expect(turned.travelled / RADIANS).toBeCloseTo(360, 9);
    expect(turned.peakRate / RADIANS).toBeCloseTo(180, 9);
    const [back] = tracksOf(await open(oneJoint('1 Yrotation', ['0', '-270'], '2')));
    expect(back.values[3] / RADIANS).toBeCloseTo(-270, 12);
    expect(measure(playAs(back, 'as-written')).travelled / RADIANS).toBeCloseTo(270, 9);
  });

  test('gives times k × Frame Time in full precision', async () => {
    const [track] = tracksOf(await open(oneJoint('1 Zrotation', ['1', '2', '3'], '0.0417083750417')));
    expect([...track.times]).toEqual([0, 0.0417083750417, 2 * 0.0417083750417]);
  });

  test('says by how much speeds are off where Frame Time is cut short', async () => {
    // NEEDS A25: 0.033 for 1/30 s is 1.01 % and 0.606 s a minute.
    const { problems } = await open(oneJoint('1 Zrotation', ['1', '2', '3'], '0.033'));
    expect(problems).toMatchObject([{ code: 'bvh.rounded-frame-time' }]);
    expect(problems[0].message).toContain(
      'speeds read 1.01 % too high, and the clip drifts 0.606 s a minute',
    );
    expect((await open(oneJoint('1 Zrotation', ['1', '2', '3'], '0.0333333'))).problems).toEqual([]);
  });

  test('reports a frame count that lies with both numbers, and reads the rows', async () => {
    const file = await open(oneJoint('1 Zrotation', ['1', '2', '3'], '0.1', '1000000000'));
    expect(file.problems).toMatchObject([{ code: 'bvh.frame-count', place: { line: 8 } }]);
    expect(file.problems[0].message).toContain('Frames says "1000000000" and 3 rows follow');
    expect(tracksOf(file)[0].times).toHaveLength(3);
  });

  test('leaves out a last row that is cut, and says so with both numbers', async () => {
    const file = await open(oneJoint('3 Zrotation Xrotation Yrotation', ['1 2 3', '4 5'], '0.1', '1'));
    expect(file.problems).toMatchObject([{ code: 'bvh.cut-row', place: { line: 11 } }]);
    expect(file.problems[0].message).toContain('has 2 numbers and the CHANNELS ask for 3');
  });

  test('names a joint whose channels are no sequence of angles, and reads the others', async () => {
    const file = await open(
      BOOM.replace('3 Yrotation Xrotation Zrotation', '3 Yrotation Yrotation Zrotation'),
    );
    expect(file.problems).toMatchObject([{ code: 'bvh.rotation-order', place: { line: 9 } }]);
    expect(tracksOf(file).map(({ id }) => id)).toEqual(['Mast', 'Mast/Winch']);
  });

  test('keeps numbers that are none, so that a rule can report them', async () => {
    const [track] = tracksOf(await open(oneJoint('1 Zrotation', ['1', 'nan', '-1.#INF', '-nan(ind)'])));
    expect([0, 3, 6, 9].map((at) => track.values[at])).toEqual([RADIANS, NaN, -Infinity, NaN]);
  });

  test.each([
    ['a first word that is none', 'SKELETON\n', 'bvh.no-hierarchy', 1],
    ['a word that is none', BOOM.replace('\tOFFSET -1', '\tOFSET -1'), 'bvh.unexpected-word', 16],
    ['an offset that is no number', BOOM.replace('0 4 0.25', '0 4 up'), 'bvh.bad-number', 8],
    ['channels that are fewer than said', BOOM.replace('3 Yrotation', '4 Yrotation'), 'bvh.channel-count', 9],
    ['a channel that is none', BOOM.replace('1 Xrotation', '1 Wrotation'), 'bvh.unknown-channel', 17],
    ['a brace too many', BOOM.replace('}\nMOTION', '}\n}\nMOTION'), 'bvh.brace', 20],
    ['a joint without a brace', BOOM.replace('ROOT Mast\n{', 'ROOT Mast'), 'bvh.brace', 3],
    ['a file cut before MOTION', BOOM.slice(0, 200), 'bvh.truncated', undefined],
    ['a file cut before Frame Time', BOOM.slice(0, BOOM.indexOf('Frame Time')), 'bvh.truncated', 21],
    ['a row before Frame Time', BOOM.replace('Frame Time: 0.04\n', ''), 'bvh.no-frame-time', 22],
    ['a frame time of 0', BOOM.replace('0.04', '0'), 'bvh.frame-time', 22],
    ['a row that is too long', BOOM.replace('\t1e2', '\t1e2 7'), 'bvh.row-length', 25],
    ['a row that is cut amid others', BOOM.replace('\t  -45.0', ''), 'bvh.row-length', 24],
    ['a decimal comma', BOOM.replace('390.000', '390,000'), 'bvh.bad-number', 25],
  ])('names %s with its line', async (_, text, code, line) => {
    await expect(open(text)).rejects.toMatchObject({
      name: 'SlewcurveError',
      code,
      place: { file: 'boom.bvh', ...(line !== undefined && { line }) },
    });
  });

  // NEEDS A16: a random smooth turn in each order that three channels can have, to six decimals as programs write them.
  test('reads a smooth turn written in each of the twelve orders as the same speeds, and no pop', async () => {
    const random = seededRandom(16);
    const wave = Array.from({ length: 9 }, () => random());
    const motion = Array.from({ length: 240 }, (_, key) => {
      const part = (i: number): number =>
        (0.3 + wave[i]) * Math.sin((0.5 + wave[i + 3]) * (key / 60) + 6 * wave[i + 6]);
      return fromEuler([0, 0, 0, 1], [part(0), 0.5 * part(1), part(2)], 'YXZ');
    });
    const peaks: number[] = [];
    for (const sequence of EULER_SEQUENCES.slice(0, 12)) {
      const wrapped = motion.flatMap((q) => [...toEuler([0, 0, 0], q, sequence)]);
      const angles = unwrapEuler(Float64Array.from(wrapped), wrapped, sequence);
      const rows = motion.map((_, key) =>
        Array.from(angles.subarray(3 * key, 3 * key + 3), (x) => (x / RADIANS).toFixed(6)).join(' '),
      );
      const channels = `3 ${sequence.replaceAll(/./g, (axis) => `${axis}rotation `)}`;
      const file = await open(oneJoint(channels, rows, '0.016666666666666666'));
      const [track] = tracksOf(file);
      expect(track.sequence).toBe(sequence);
      const rates = Array.from(
        { length: 239 },
        (_, key) => segmentAngle(track, key) / (track.times[key + 1] - track.times[key]),
      );
      peaks.push(Math.max(...rates));
      const pops = file.clips.flatMap((clip) => surveyClip(clip, file.nodes)).map(({ rule }) => rule);
      expect(pops.filter((rule) => rule.startsWith('jump.') || rule === 'turn.wrap')).toEqual([]);
    }
    const own = Math.max(...motion.slice(1).map((q, key) => angleBetween(motion[key], q) * 60));
    for (const peak of peaks) expect(Math.abs(peak / own - 1)).toBeLessThan(1e-4);
  });
});
