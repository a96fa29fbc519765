import { readFileSync, readdirSync } from 'node:fs';
import { Ajv2020 } from 'ajv/dist/2020.js';
import { rotationTrack, type RotationTrack } from '@slewcurve/core';
import { bufferSource, openAnimation } from '@slewcurve/formats';
import {
  VERSION,
  buildReport,
  jsonReport,
  kestrelPoint,
  surveyFile,
  textReport,
  unreadableFile,
  type FileReport,
  type JobSettings,
} from '@slewcurve/job';
import { NO_HOUSE_RULES, surveyTrack, type Finding } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';

const SETTINGS: JobSettings = {
  playbacks: ['as-written'],
  failAt: 'warning',
  allowWarnings: 0,
  houseRules: NO_HOUSE_RULES,
};
const name = 'kestrel-point.glb';

async function demoReport(settings: JobSettings = SETTINGS): Promise<FileReport> {
  return surveyFile(name, await openAnimation(bufferSource(kestrelPoint()), { name }), settings);
}

/** A checker for one of the schemas that the package publishes. */
function schema(which: string): (value: unknown) => unknown[] {
  const validate = new Ajv2020({ allErrors: true, strict: false }).compile(
    JSON.parse(readFileSync(`packages/job/schema/${which}.json`, 'utf8')),
  );
  return (value) => (validate(value) ? [] : (validate.errors ?? []));
}

describe('the report', () => {
  test('holds to its published schema, and so does one of a file that can’t be read', async () => {
    const files = [
      await demoReport(),
      unreadableFile(
        'x.glb',
        await caught(openAnimation(bufferSource(new Uint8Array(9)), { name: 'x.glb' })),
      ),
    ];
    const report: unknown = JSON.parse(jsonReport(buildReport(files, SETTINGS)));
    expect(schema('report')(report)).toEqual([]);
  });

  test('a report that breaks its schema is told from one that holds', async () => {
    const report = JSON.parse(jsonReport(buildReport([await demoReport()], SETTINGS)));
    report.files[0].findings[0].level = 'fatal';
    delete report.totals;
    expect(schema('report')(report)).toHaveLength(2);
  });

  test('gives the same text for the same file', async () => {
    expect(jsonReport(buildReport([await demoReport()], SETTINGS))).toBe(
      jsonReport(buildReport([await demoReport()], SETTINGS)),
    );
  });

  test('gives measured numbers to six significant digits, and times as they are stored', async () => {
    const { tracks, findings } = await demoReport();
    for (const { peakRate, travelled, end } of tracks) {
      expect(peakRate).toBe(Number(peakRate.toPrecision(6)));
      expect(travelled).toBe(Number(travelled.toPrecision(6)));
      expect(Math.fround(end)).toBe(end);
    }
    for (const { value } of findings) expect(value).toBe(Number(value.toPrecision(6)));
  });

  test('says what a steady turn measures: 36 deg/s, 1,080°', async () => {
    const track = (await demoReport()).tracks.find(({ clip }) => clip === 'lens-thirds');
    // float32 keys at 3 s: 1e-4 relative is far above their rounding.
    expect(track?.peakRate).toBeCloseTo(36, 3);
    expect(track?.travelled).toBeCloseTo(1080, 2);
    expect(track?.accelerationIs).toBe('step');
  });
});

describe('verdict', () => {
  test.each([
    [[], {}, 'pass'],
    [['note'], {}, 'pass'],
    [['note'], { failAt: 'note' }, 'fail'],
    [['warning'], {}, 'fail'],
    [['warning'], { failAt: 'error' }, 'pass'],
    [['warning', 'warning'], { allowWarnings: 2 }, 'pass'],
    [['warning', 'warning'], { allowWarnings: 1 }, 'fail'],
    [['error'], { allowWarnings: 5 }, 'fail'],
    [['note', 'warning'], { failAt: 'note', allowWarnings: 1 }, 'fail'],
  ] as const)('%j under %j: %s', (levels, change, verdict) => {
    expect(buildReport([fileWith(levels)], { ...SETTINGS, ...change }).verdict).toBe(verdict);
  });

  test('a file that can’t be read never passes', () => {
    const file: FileReport = {
      file: 'x',
      status: 'unreadable',
      error: { code: 'gltf.truncated', message: 'Cut.' },
      clips: [],
      tracks: [],
      findings: [],
    };
    const report = buildReport([file], SETTINGS);
    expect(report.verdict).toBe('fail');
    expect(textReport(report)).toBe(
      'x: can’t be read. Cut. error gltf.truncated\nverdict: fail. 0 errors, 0 warnings, 0 notes in 1 file, 0 stamped; 1 could not be read\n'.replaceAll(
        '’',
        "'",
      ),
    );
  });
});

describe('fingerprints', () => {
  test('stay as they are when a file is exported anew two keys later', () => {
    expect(placesOf(0)).toHaveLength(1);
    expect(placesOf(2)).toEqual(placesOf(0));
  });
});

test('VERSION is that of every package', () => {
  for (const folder of readdirSync('packages'))
    expect(JSON.parse(readFileSync(`packages/${folder}/package.json`, 'utf8')).version, folder).toBe(VERSION);
});

/** 2 s of sway at 60 Hz about x with one key 5° off, all of it `shift` keys later behind a hold. */
function swayWithPop(shift: number): RotationTrack {
  const count = 120 + shift;
  const times = Array.from({ length: count }, (_, k) => k / 60);
  const values = times.flatMap((_, k) => {
    const own = Math.max(0, k - shift);
    const half = (10 * Math.sin(own / 20) + (own === 60 ? 5 : 0)) * (Math.PI / 360);
    return [Math.sin(half), 0, 0, Math.cos(half)];
  });
  return rotationTrack({ times, values, id: 'hip', clip: 'walk' });
}

/** Fingerprints of what is found on the sway. */
function placesOf(shift: number): string[] {
  return surveyTrack(swayWithPop(shift)).flatMap(({ occurrences }) =>
    occurrences.map((place) => place.fingerprint),
  );
}

function findingOf(level: Finding['level'], i: number): Finding {
  return {
    rule: 'jump.lone-key',
    level,
    clip: 'c',
    track: `t${i}`,
    keys: [1],
    span: [0, 1],
    time: 0.5,
    value: 2,
    unit: 'deg',
    limit: 1,
    playback: 'as-written',
    owner: `t${i}`,
    count: 1,
    occurrences: [],
    message: 'key 1 stands off',
    fingerprint: String(i),
  };
}

function fileWith(levels: readonly Finding['level'][]): FileReport {
  return { file: 'f', status: 'surveyed', clips: [], tracks: [], findings: levels.map(findingOf) };
}

function caught(promise: Promise<unknown>): Promise<unknown> {
  return promise.then(
    () => new Error('nothing was thrown'),
    (error: unknown) => error,
  );
}
