import { expect, test } from 'vitest';
import { openApp } from '../support/open-app.js';

const SOON = { timeout: 10_000 };
/** 2 degrees a frame about y at 30 a second; what the numbers are no header says. */
const ROWS = Array.from({ length: 61 }, (_, frame) => `${frame / 30},0,${2 * frame},0`).join('\n');

function file(name: string, text: string): { name: string; mimeType: string; buffer: Buffer } {
  return { name, mimeType: 'text/csv', buffer: Buffer.from(text) };
}

test('a table without a telling header is asked about, shows what the answer makes of it, and opens by it', async () => {
  const page = await openApp({ withoutHandles: true });
  await page.locator('slew-app input.files').setInputFiles(file('pan.csv', `${ROWS}\n`));
  const form = page.getByRole('form', { name: 'What pan.csv is read by' });
  await form.waitFor();
  const effect = form.getByRole('status');
  await expect.poll(() => effect.textContent(), SOON).toContain('What the columns are is still to be told');
  expect(await form.getByRole('button', { name: 'Read it so' }).isDisabled()).toBe(true);
  expect(await form.getByRole('cell').allTextContents()).toContain('0.03333333333333333');
  for (const [i, name] of ['t_s', 'rx', 'ry', 'rz'].entries()) {
    await form.getByLabel(`name of column ${i + 1}`).fill(name);
    await form.getByLabel(`name of column ${i + 1}`).blur();
  }
  await expect.poll(() => effect.textContent(), SOON).toContain('the sequence of the angles and their unit');
  await form.getByLabel('sequence of the angles').selectOption('YXZ');
  await form.getByLabel('unit of the angles').selectOption('rad');
  await expect.poll(() => effect.textContent(), SOON).toContain('at most 3,438 deg/s');
  await form.getByLabel('unit of the angles').selectOption('deg');
  await expect.poll(() => effect.textContent(), SOON).toContain('61 keys, at most 60 deg/s');
  await form.getByLabel('up axis').selectOption('+z');
  await form.getByRole('button', { name: 'Read it so' }).click();
  await page.getByText('1 rotation track in 1 clip').waitFor();
  const shown = page.locator('slew-app summary', { hasText: 'read by:' });
  expect(await shown.textContent()).toContain('up axis +z');
  expect(await shown.textContent()).toContain('angle sequence YXZ, angle unit degrees');
});

test('playbacks by tick rate stand in a table, and a number leads to its place', async () => {
  const page = await openApp({ address: '?demo' });
  await page.getByText('12 rotation tracks in').waitFor();
  await page.getByRole('searchbox', { name: 'Find a track' }).fill('beetle-hip');
  await page.locator('slew-roster .option', { hasText: 'beetle-hip' }).first().click();
  await page.locator('slew-chart', { hasText: 'beetle-hip' }).waitFor();
  await page.getByText('Compare playbacks').click();
  const table = page.locator('slew-playback-matrix table');
  await table.waitFor();
  const row = table.getByRole('row', { name: /^finite cubic/ });
  // 1.08 million deg/s as a finite cubic (DEMO, measured in a prototype).
  await expect.poll(() => row.textContent(), SOON).toMatch(/1,0[78]\d,\d{3} deg\/s at 0\.650 s/);
  await row.getByRole('button').first().click();
  await page.locator('slew-chart ol path.second').first().waitFor();
  await page.getByLabel('and stores the keys as').selectOption('int8');
  await expect
    .poll(() => table.getByRole('row', { name: /^as written/ }).textContent(), SOON)
    .toMatch(/0\.\d+°/);
});

test('one switch writes all times of the page as frames or timecode, by the grid that was found or is said', async () => {
  const page = await openApp({ address: '?demo' });
  await page.getByText('12 rotation tracks in').waitFor();
  await page.getByRole('searchbox', { name: 'Find a track' }).fill('crane-head');
  await page.locator('slew-roster .option', { hasText: 'crane-head' }).first().click();
  const chart = page.locator('slew-chart', { hasText: 'crane-head' });
  await chart.waitFor();
  const rows = chart.locator('.from');
  expect(await rows.nth(1).textContent()).toBe('10 s');
  await page.getByLabel('times in').selectOption('timecode');
  await expect.poll(() => rows.nth(1).textContent(), SOON).toBe('00:00:10:00');
  const notes = chart.locator('.notes').first();
  expect(await notes.textContent()).toMatch(/00:00:\d\d:\d\d/);
  expect(await page.getByText('3-D view at').textContent()).toContain('00:00:00:00');
  await page.getByLabel('times in').selectOption('frames');
  await page.getByLabel(/^frames a second/).fill('24');
  await page.getByLabel(/^frames a second/).blur();
  await expect.poll(() => rows.nth(1).textContent(), SOON).toBe('frame 240');
});
