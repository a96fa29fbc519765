import { expect, test } from 'vitest';
import { focused } from '../support/by-keyboard.js';
import { openApp } from '../support/open-app.js';

/** A page under load may be late. */
const SOON = { timeout: 20_000 };

test('the address ?demo opens the demo scene, under its own house rules', async () => {
  const page = await openApp({ address: '?demo' });
  await page.getByText('12 rotation tracks in').waitFor();
  // Only the house rules say that the beetle's clips repeat; the knee's end is 3.0° off its start (DEMO).
  await page.getByRole('searchbox', { name: 'Find a track' }).fill('beetle-knee');
  await page.locator('slew-roster .option').first().click();
  await page
    .locator('slew-chart .notes .message', { hasText: 'The loop ends 3.0° off its start' })
    .waitFor(SOON);
  // DEMO: the head follows at no more than 20 deg/s in this clip; at most 30 elsewhere.
  await page.getByRole('button', { name: 'Roster: all tracks' }).click();
  await page.getByRole('searchbox', { name: 'Find a track' }).fill('scope-pass');
  await page.locator('slew-roster .option').first().click();
  await expect
    .poll(() => page.locator('slew-chart .limit-name').first().textContent(), SOON)
    .toBe('house rule 20 deg/s');
});

test('another playback is surveyed anew, and two stand on one paper with what they differ by', async () => {
  const page = await openApp({ address: '?demo' });
  await page.getByText('12 rotation tracks in').waitFor();
  await page.getByRole('searchbox', { name: 'Find a track' }).fill('beetle-hip');
  await page.locator('slew-roster .option').first().click();
  const note = page.locator('slew-chart .notes .level');
  await note.filter({ hasText: 'note turn.sign-flip' }).first().waitFor(SOON);

  await page.getByLabel('compare with:').selectOption('finite-cubic');
  const legend = page.locator('slew-chart .legend');
  // 114 deg/s the short way and 1.08 million as a finite cubic (DEMO, measured in a prototype).
  expect(await legend.textContent()).toMatch(/as written, up to 114 deg\/s/);
  const cubic = /finite cubic, up to ([\d,]+) deg\/s/.exec((await legend.textContent()) ?? '')?.[1] ?? '';
  expect(Math.abs(Number(cubic.replaceAll(',', '')) - 1.08e6)).toBeLessThan(0.005e6);
  await page.locator('slew-chart ol path.second').first().waitFor();

  await page.getByLabel('as played:').selectOption('finite-cubic');
  await note.filter({ hasText: 'error turn.sign-flip' }).first().waitFor(SOON);
});

test('Space plays and stops; the cursor and the 3-D view go together', async () => {
  const page = await openApp({ address: '?demo' });
  await page.getByText('12 rotation tracks in').waitFor();
  await page.getByRole('searchbox', { name: 'Find a track' }).fill('lens-thirds');
  await page.keyboard.press('Enter');
  const cursor = page.getByRole('slider', { name: /^Cursor on the trace/ });
  await expect.poll(() => focused(page), SOON).toMatch(/^Cursor on the trace/);
  await page.keyboard.press('Space');
  await expect
    .poll(async () => Number(await cursor.getAttribute('aria-valuenow')), SOON)
    .toBeGreaterThan(0.2);
  await page.keyboard.press('Space');
  const stoppedAt = await cursor.getAttribute('aria-valuenow');
  const view = page.getByText(`3-D view at ${Number(stoppedAt).toFixed(2)} s`);
  await view.waitFor();
  expect(await cursor.getAttribute('aria-valuenow')).toBe(stoppedAt);
});
