import { measure, playAs, rotationTrack, type PlaybackId } from '@slewcurve/core';
import { expect, test } from 'vitest';
import { sharedFile } from '../support/shared-data.js';

// Source: peaks worked out with another program beforehand, printed to the digit given.
const FILE = sharedFile('demo/beetle-hip.csv');

test.skipIf(FILE.absent).each([
  ['short-way', 114.29, 0.005],
  ['raw-chord', 648_644, 0.5],
  ['finite-cubic', 1_080_000, 5000],
] as const)(
  'the sign change in the beetle’s hip peaks under %s at %d deg/s',
  (id: PlaybackId, peak, within) => {
    const rows = new TextDecoder()
      .decode(FILE.read())
      .trim()
      .split('\n')
      .slice(1)
      .map((row) => row.split(',').map(Number));
    const track = rotationTrack({
      times: rows.map(([t]) => t),
      values: rows.flatMap((row) => row.slice(1, 5)),
    });
    expect(Math.abs((measure(playAs(track, id)).peakRate * 180) / Math.PI - peak)).toBeLessThan(within);
  },
);
