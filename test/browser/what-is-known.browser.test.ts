import { readFile, writeFile } from 'node:fs/promises';
import axe from 'axe-core';
import { kestrelPoint } from '@slewcurve/job';
import type { Page } from 'playwright';
import { expect, test } from 'vitest';
import { focused, tabTo } from '../support/by-keyboard.js';
import { generatedTake } from '../support/generated-take.js';
import { openApp } from '../support/open-app.js';
import { commandFolder } from '../support/run-command.js';

// What the survey knows beyond single findings, on the page: one instant on many tracks is one event, findings are accepted with a reason as the
// command does it, and a clip is a loop once somebody says so.

const ARTEFACTS = 'test/browser/artefacts';
const TALL = { viewport: { width: 1280, height: 1100 }, reducedMotion: 'reduce' } as const;

/** Five joints that all stand 8° off at frame 30. */
const POPPED = generatedTake({
  joints: 5,
  frames: 60,
  rate: 60,
  flat: true,
  pop: { joint: 'every', frame: 30, degrees: 8 },
});

test('one instant on five tracks is one event, and a finding of it is accepted and taken back as by the command', async () => {
  const place = await commandFolder();
  await writeFile(place.path('take.glb'), POPPED);
  const page = await openApp(TALL);
  await page.locator('input.files').setInputFiles(place.path('take.glb'));
  await page.getByText('5 rotation tracks in').waitFor();

  const events = page.getByRole('region', { name: 'At the same instant on several tracks' });
  await expect
    .poll(() => events.locator('li').first().textContent())
    .toMatch(/0\.500 s: 5 tracks jump within one frame: one event; look at joint-0 first/);
  await events.getByRole('button', { name: 'Show its 5 tracks' }).first().click();
  expect(await events.locator('.tracks button').allTextContents()).toEqual(
    [0, 1, 2, 3, 4].map((joint) => `joint-${joint}`),
  );
  await pictures(page, 'events');
  await events.getByRole('button', { name: 'Open joint-0' }).first().click();
  const note = page.locator('slew-chart .notes li').first();
  await expect.poll(() => note.textContent()).toMatch(/one of 5 tracks at 0\.50 s; owner joint-0/);

  await acceptByMouse(page);
  expect(await note.getAttribute('class')).toContain('stamped');
  expect(await note.textContent()).toContain('Accepted: the hit is meant (Ada, ');
  const words = page.locator('slew-chart details', { hasText: 'The chart in words' });
  await words.locator('summary').click();
  // The words are made once they are asked for.
  await expect
    .poll(() => words.textContent())
    .toContain('one of 5 tracks at 0.50 s; owner joint-0. Accepted: the hit is');
  await expectCommandsStamps(place, page);

  await page.getByRole('button', { name: 'Docket: report' }).click();
  await page.getByText('stamped: the hit is meant (Ada, ').first().waitFor();
  await page.getByRole('button', { name: 'Chart: one track' }).click();
  await page.getByRole('button', { name: /^Take the acceptance back/ }).click();
  await page.getByText('1 accepted.').waitFor({ state: 'detached' });
  await acceptByKeyboard(page);
  await page.reload();
  await page.getByText('An earlier visit left 1 accepted place on take.glb').waitFor();
  await page.getByRole('button', { name: 'Go on with it' }).click();
  await page.getByText('1 accepted.').waitFor();
});

test('stamps and house rules are taken from files beside the animation, and what is wrong with them is said by its code', async () => {
  const place = await commandFolder();
  await writeFile(place.path('take.glb'), POPPED);
  await place.run('check', 'take.glb', '--stamp', 'jump.lone-key', '--reason', 'hits', '--by', 'Ada');
  const page = await openApp(TALL);
  const choose = (...names: string[]): Promise<void> =>
    page.locator('input.files').setInputFiles(names.map((name) => place.path(name)));
  await choose('take.glb', 'take.glb.stamps.json');
  await page.getByText('5 accepted.').waitFor();

  await writeFile(place.path('house-rules.json'), '{"levels": {"jump.no-such": "off"}}');
  await choose('house-rules.json');
  await page.getByText('(house-rules.unknown-rule)').waitFor();
  await writeFile(place.path('house-rules.json'), '{"levels": {"jump.lone-key": "off"}}');
  await choose('house-rules.json');
  await page.getByText('house rules: house-rules.json').waitFor();
  await page.getByText('5 stamps fit nothing any more.').waitFor();
  await page.getByRole('button', { name: 'Put the house rules away' }).click();
  await page.getByText('5 accepted.').waitFor();
  expect(await page.getByText('house rules:').count()).toBe(0);
});

test('a clip that ends where it starts is asked about, and is a loop once somebody says so by keyboard or mouse', async () => {
  const place = await commandFolder();
  await writeFile(place.path('scene.glb'), kestrelPoint());
  const page = await openApp(TALL);
  await page.locator('input.files').setInputFiles(place.path('scene.glb'));
  await page.getByText('12 rotation tracks in').waitFor();
  const offers = page.locator('.loops summary');
  expect(await offers.textContent()).toBe('3 clips end where they start: do they loop?');
  await page.getByRole('searchbox', { name: 'Find a track' }).fill('beetle-hip');
  await page.locator('slew-roster .option').first().click();
  const loop = page.getByRole('checkbox', { name: /plays as a loop/ });
  await loop.waitFor();
  expect(await loop.isChecked()).toBe(false);
  await page
    .getByText(/ends where it starts in .*: does it loop\?/)
    .last()
    .waitFor();
  await pictures(page, 'loop asked');

  await tabTo(page, /plays as a loop/);
  await page.keyboard.press('Space');
  await page.getByText('2 clips end where they start').waitFor();
  expect(await loop.isChecked()).toBe(true);
  await page.locator('slew-chart option', { hasText: ', one loop' }).waitFor({ state: 'attached' });
  await offers.click();
  await page.locator('.loops button').first().click();
  await page.getByText('lens-halves ends where it starts in its one moving track: does it loop?').waitFor();
  await loop.click();
  await page.getByText('2 clips end where they start').waitFor();
});

async function acceptByMouse(page: Page): Promise<void> {
  await page
    .getByRole('button', { name: /^Accept with a reason/ })
    .first()
    .click();
  await page.getByRole('button', { name: 'Accept it' }).click();
  await page.getByText('Say why it is as it should be.').waitFor();
  await pictures(page, 'accepting');
  await page.getByRole('textbox', { name: 'because' }).fill('the hit is meant');
  await page.getByRole('textbox', { name: 'says' }).fill('Ada');
  await page.getByRole('button', { name: 'Accept it' }).click();
  await page.getByText('1 accepted.').waitFor();
}

async function acceptByKeyboard(page: Page): Promise<void> {
  await tabTo(page, /^Accept with a reason/);
  await page.keyboard.press('Enter');
  await expect.poll(() => focused(page)).toBe('because');
  await page.keyboard.type('the hit is meant');
  await page.keyboard.press('Tab');
  await page.keyboard.type('Ada');
  await page.keyboard.press('Enter');
  await page.getByText('1 accepted.').waitFor();
}

/** What the page saves is, to the byte, what the command writes for the same finding, reason and name. */
async function expectCommandsStamps(
  place: Awaited<ReturnType<typeof commandFolder>>,
  page: Page,
): Promise<void> {
  const download = page.waitForEvent('download');
  await page.getByRole('button', { name: 'Save what is accepted' }).first().click();
  const saved = await download;
  expect(saved.suggestedFilename()).toBe('take.glb.stamps.json');
  const bytes = await readFile(await saved.path(), 'utf8');
  const { stamps }: { stamps: readonly { fingerprint: string }[] } = JSON.parse(bytes);
  const [{ fingerprint }] = stamps;
  const words = ['--reason', 'the hit is meant', '--by', 'Ada'];
  await place.run('check', 'take.glb', '--stamp', fingerprint, ...words);
  expect(bytes).toBe(await readFile(place.path('take.glb.stamps.json'), 'utf8'));
}

/** A picture in light, dark and 360 px wide; nothing for axe to find in any of them. */
async function pictures(page: Page, name: string): Promise<void> {
  const found: unknown[] = [];
  const look = async (as: string): Promise<void> => {
    await page.screenshot({ path: `${ARTEFACTS}/${name}, ${as}.png`, fullPage: true });
    await page.evaluate(axe.source);
    const { violations } = await page.evaluate(() => window.axe.run({ resultTypes: ['violations'] }));
    found.push(...violations.flatMap(({ id, nodes }) => nodes.map(({ target }) => [as, id, target])));
  };
  await look('light');
  await page.emulateMedia({ colorScheme: 'dark' });
  await look('dark');
  await page.emulateMedia({ colorScheme: 'light' });
  await page.setViewportSize({ width: 360, height: 740 });
  await look('360 px');
  expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBe(360);
  await page.setViewportSize(TALL.viewport);
  expect(found).toEqual([]);
}
