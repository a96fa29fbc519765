import { describe, expect, test } from 'vitest';
import { replaceTrack, type RotationTrack } from '@slewcurve/core';
import { BOOM } from '../../support/bvh-text.js';
import { openText, rewritten, tracksOf } from '../../support/text-files.js';

const RADIANS = Math.PI / 180;
const named = async (id: string): Promise<RotationTrack> => {
  const track = tracksOf(await openText(BOOM, 'boom.bvh')).find((other) => other.id === id);
  if (!track) throw new Error(`no ${id}`);
  return track;
};

/** The track with the angle `part` of key `key` set, degrees. */
function withAngle(track: RotationTrack, key: number, part: number, degrees: number): RotationTrack {
  const values = track.values.slice();
  values[3 * key + part] = degrees * RADIANS;
  return replaceTrack(track, { values });
}

const refused = async (track: RotationTrack): Promise<unknown> =>
  rewritten(BOOM, 'boom.bvh', [track]).catch((error: unknown) => error);

describe('writing a BVH file', () => {
  test('changes nothing where nothing changed', async () => {
    const tracks = tracksOf(await openText(BOOM, 'boom.bvh'));
    expect(await rewritten(BOOM, 'boom.bvh', [])).toBe(BOOM);
    expect(await rewritten(BOOM, 'boom.bvh', tracks)).toBe(BOOM);
  });

  test('changes one number and not a byte beside it, in its decimals and its width', async () => {
    const changed = withAngle(await named('Mast'), 1, 1, 9.8765);
    expect(await rewritten(BOOM, 'boom.bvh', [changed])).toBe(BOOM.replace('200.000', '  9.877'));
  });

  test.each([
    ['a padded column keeps its width', 'Mast', 0, 0, 123.4567, '  0.000  10', '123.457  10'],
    ['a padded column grows where there is no room', 'Mast', 0, 0, -1234.5, '  0.000  10', '-1234.500  10'],
    ['a number without a leading zero stays without', 'Mast/Long Boom', 0, 2, -0.5, '-.250', '-.500'],
    ['a number with a plus keeps it', 'Mast/Long Boom', 2, 2, 0.25, '+.500', '+.250'],
    ['an exponent stays one', 'Mast/Winch', 2, 0, 300, '1e2', '3e2'],
    [
      'a whole number in a column of decimals gets the decimals',
      'Mast/Long Boom',
      1,
      1,
      0.5,
      '\t0\t-.125',
      '\t0.500\t-.125',
    ],
  ])('%s', async (_, id, key, part, degrees, old, made) => {
    const changed = withAngle(await named(id), key, part, degrees);
    expect(await rewritten(BOOM, 'boom.bvh', [changed])).toBe(BOOM.replace(old, made));
  });

  test('keeps CRLF and tabs', async () => {
    const text = BOOM.replaceAll('\n', '\r\n');
    const [, boom] = tracksOf(await openText(text, 'boom.bvh'));
    expect(await rewritten(text, 'boom.bvh', [withAngle(boom, 0, 0, 351.25)])).toBe(
      text.replace('350.00', '351.250'),
    );
  });

  test('reads back what it wrote, to half a step of the decimals', async () => {
    const tracks = tracksOf(await openText(BOOM, 'boom.bvh'));
    const changed = tracks.map((track) =>
      replaceTrack(track, { values: track.values.map((x, i) => (x === 0 && i % 3 > 0 ? x : x + 0.3)) }),
    );
    const again = tracksOf(await openText(await rewritten(BOOM, 'boom.bvh', changed), 'boom.bvh'));
    again.forEach((track, i) => {
      const step = 0.5 * 10 ** -(tracks[i].storage.decimals ?? 0) * RADIANS;
      // The exponent's one digit is coarser: 1e2 is written in steps of 100.
      const last = track.id === 'Mast/Winch' ? 6 : track.values.length;
      for (let at = 0; at < last; at++)
        expect(Math.abs(track.values[at] - changed[i].values[at])).toBeLessThan(step * 1.001);
    });
  });

  test('refuses what the format cannot hold, and says why', async () => {
    const mast = await named('Mast');
    const winch = await named('Mast/Winch');
    const later = replaceTrack(mast, { times: mast.times.map((time) => time * 1.5) });
    const longer = replaceTrack(mast, { times: [0, 0.04, 0.08, 0.12], values: new Float64Array(12) });
    const turned = replaceTrack(mast, {
      interpolation: 'LINEAR',
      values: [0, 0, 0, 1, 0, 0, 0, 1, 0, 0, 0, 1],
    });
    expect(await refused(later)).toMatchObject({ code: 'bvh.fixed-grid', place: { track: 'Mast' } });
    expect(await refused(longer)).toMatchObject({ code: 'bvh.fixed-grid' });
    expect(await refused(withAngle(winch, 1, 2, 5))).toMatchObject({
      code: 'bvh.fixed-channels',
      place: { key: 1 },
    });
    expect(await refused(withAngle(mast, 1, 2, NaN))).toMatchObject({
      code: 'plan.cannot-write',
      place: { key: 1 },
    });
    expect(await refused(turned)).toMatchObject({ code: 'plan.cannot-write' });
    expect(await refused(replaceTrack(mast, { sequence: 'XYZ' }))).toMatchObject({
      code: 'plan.cannot-write',
    });
    expect(await refused({ ...mast, id: 'Keel' })).toMatchObject({ code: 'plan.unknown-track' });
    const twice = rewritten(BOOM, 'boom.bvh', [mast, mast]);
    await expect(twice).rejects.toMatchObject({ code: 'plan.doubled-track' });
  });
});
