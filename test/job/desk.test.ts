import { bufferSource } from '@slewcurve/formats';
import {
  UNWATCHED,
  desk,
  kestrelPoint,
  mendFile,
  openFile,
  surveyFile,
  type JobSettings,
  type Watch,
} from '@slewcurve/job';
import { NO_HOUSE_RULES } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';

const SETTINGS: JobSettings = {
  playbacks: ['as-written'],
  failAt: 'warning',
  allowWarnings: 0,
  houseRules: NO_HOUSE_RULES,
};
const name = 'kestrel-point.glb';

async function surveyedDesk(): Promise<ReturnType<typeof desk>> {
  const here = desk();
  await here.open('f', bufferSource(kestrelPoint()), name);
  await here.survey('f', SETTINGS, UNWATCHED, () => {});
  return here;
}

describe('desk', () => {
  test('tells every row before the survey is through, and then the same report as the command', async () => {
    const here = desk();
    const opened = await here.open('f', bufferSource(kestrelPoint()), name);
    const rows: string[] = [];
    const report = await here.survey('f', SETTINGS, UNWATCHED, (row) => rows.push(row.clip));
    expect(rows).toEqual(opened.tracks.map(({ clip }) => clip));
    const { file } = await openFile(bufferSource(kestrelPoint()), { name });
    expect(report).toEqual(await surveyFile(name, file, SETTINGS));
  });

  test('makes a card true, takes it back, and gives the bytes that the command gives', async () => {
    const here = await surveyedDesk();
    const { steps } = here.propose('f', []);
    const [ankle] = steps.filter(({ clip }) => clip === 'beetle-ankle');
    const answer = await here.card('f', [ankle], UNWATCHED);
    expect(answer.tracks.map(({ report }) => report.clip)).toEqual(['beetle-ankle']);
    expect(answer.tracks[0].findings.filter(({ rule }) => rule === 'jump.shelf')).toEqual([]);
    const { bytes, sha256 } = await here.bytes('f', UNWATCHED);

    const opened = await openFile(bufferSource(kestrelPoint()), { name });
    const before = await surveyFile(name, opened.file, SETTINGS);
    const { result } = await mendFile(opened, { schemaVersion: 1, steps: [ankle] }, before, SETTINGS, {
      name,
    });
    expect(Buffer.from(bytes).equals(Buffer.from(await result.read(0, result.size)))).toBe(true);
    expect(sha256).toMatch(/^[0-9a-f]{64}$/);

    const back = await here.card('f', [], UNWATCHED);
    expect(back.tracks.map(({ report }) => report.clip)).toEqual(['beetle-ankle']);
    expect(Buffer.from((await here.bytes('f', UNWATCHED)).bytes).equals(Buffer.from(kestrelPoint()))).toBe(
      true,
    );
  });

  test('proposes from what the card leaves, so that nothing is mended twice', async () => {
    const here = await surveyedDesk();
    const { steps } = here.propose('f', []);
    await here.card('f', steps, UNWATCHED);
    expect(here.propose('f', []).steps).toEqual([]);
    await here.card('f', [], UNWATCHED);
    expect(here.propose('f', []).steps).toEqual(steps);
  });

  test('keeps the card before where a step can’t be done', async () => {
    const here = await surveyedDesk();
    const { steps } = here.propose('f', []);
    await here.card('f', steps.slice(0, 1), UNWATCHED);
    const bad = { verb: 'lift out', clip: 'beetle-ankle', track: 'nobody', keys: [1] };
    await expect(here.card('f', [bad], UNWATCHED)).rejects.toThrow(
      expect.objectContaining({ code: 'step.no-match' }),
    );
    const { card } = await here.bytes('f', UNWATCHED);
    expect(card.steps).toEqual(steps.slice(0, 1));
  });

  test('stops a survey when it is told to', async () => {
    const here = desk();
    await here.open('f', bufferSource(kestrelPoint()), name);
    let asked = 0;
    const watch: Watch = {
      get stopped() {
        return ++asked > 3;
      },
      report() {},
      async pause() {},
    };
    await expect(here.survey('f', SETTINGS, watch, () => {})).rejects.toThrow(
      expect.objectContaining({ code: 'job.stopped' }),
    );
  });

  test('says what is not there', async () => {
    const here = desk();
    expect(() => here.track('g', 'c', 't')).toThrow(expect.objectContaining({ code: 'job.not-open' }));
    await here.open('f', bufferSource(kestrelPoint()), name);
    expect(() => here.track('f', 'c', 't')).toThrow(expect.objectContaining({ code: 'job.no-track' }));
    expect(() => here.propose('f', [])).toThrow(expect.objectContaining({ code: 'job.not-surveyed' }));
  });

  test('tries a step as a card would make it, with its price, and keeps nothing', async () => {
    const here = await surveyedDesk();
    const { tracks } = await here.open('g', bufferSource(kestrelPoint()), name);
    const { clip, track } = tracks.find((one) => one.clip === 'scope-pass') ?? tracks[0];
    const step = { verb: 'cap', clip, track, rate: 20 };
    const tried = here.trial('f', clip, track, step);
    // DEMO: +1.84 s within 5 %.
    expect(Math.abs((tried.price?.seconds ?? 0) / 1.84 - 1)).toBeLessThan(0.05);
    expect(here.track('f', clip, track).after.times).not.toEqual(tried.after?.times);
    const { steps } = await here.card('f', [step], UNWATCHED);
    expect(steps[0]?.changed).toBe(tried.changed);
    const { after } = here.track('f', clip, track);
    expect([...(tried.after?.times ?? [])]).toEqual([...after.times]);
    expect([...(tried.after?.values ?? [])]).toEqual([...after.values]);
  });

  test('tries a pace that is copied from another track', async () => {
    const here = await surveyedDesk();
    const own = (await here.open('g', bufferSource(kestrelPoint()), name)).tracks.filter(
      (one) => one.clip !== 'scope-pass',
    );
    const [to] = own;
    const from = own.find((one) => one.clip !== to.clip) ?? to;
    const step = {
      verb: 'copy pace',
      clip: to.clip,
      track: to.track,
      fromClip: from.clip,
      fromTrack: from.track,
    };
    expect(here.trial('f', to.clip, to.track, step).changed).toBeGreaterThan(0);
  });

  test('says why a step can’t be done, without a number: there is but one', async () => {
    const here = await surveyedDesk();
    const { clip, track } = (await here.open('g', bufferSource(kestrelPoint()), name)).tracks[0];
    const bad = { verb: 'hold', clip, track, at: 1e6, seconds: 1 };
    expect(() => here.trial('f', clip, track, bad)).toThrow(
      expect.objectContaining({ code: 'step.needs-hold', message: expect.stringMatching(/^Say when/) }),
    );
  });

  test('hands over one object twice where a track is not edited', async () => {
    const here = await surveyedDesk();
    const { track } = await here
      .open('g', bufferSource(kestrelPoint()), name)
      .then(({ tracks }) => tracks[0]);
    const { before, after } = here.track('f', 'lens-thirds', track);
    expect(after).toBe(before);
  });
});
