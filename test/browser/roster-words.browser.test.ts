import { expect, test } from 'vitest';
import { openApp } from '../support/open-app.js';

test('the find field answers to the joint that is meant, to what was found, and says what other words lead to', async () => {
  const page = await openApp({ address: '?demo' });
  await page.getByText('rotation tracks in').waitFor();
  const find = page.getByRole('searchbox', { name: 'Find a track' });
  const names = (): Promise<string[]> => page.locator('slew-roster .option .name').allTextContents();

  await find.fill('ankle');
  await expect.poll(names).toEqual([expect.stringContaining('left-fore-ankle')]);
  await find.fill('pop');
  await page.getByRole('option', { name: /^crane-head in / }).waitFor();
  await find.fill('easing');
  await page.getByText('No track answers to “easing”').waitFor();
  await page.getByText('Starts and stops softly').waitFor();
  await find.fill('motion path');
  await page.getByText('3-D view').first().waitFor();
});

test('Ctrl+S saves a mended copy, and says so where there is nothing to save', async () => {
  const page = await openApp({ address: '?demo' });
  await page.getByText('rotation tracks in').waitFor();
  await page.keyboard.press('Control+s');
  await page.getByText('There is no edit of kestrel-point.glb to save.').waitFor();
  await page.getByRole('button', { name: 'Mend all that is proposed' }).click();
  await page.getByText('not saved yet').waitFor({ timeout: 30_000 });
  const [download] = await Promise.all([page.waitForEvent('download'), page.keyboard.press('Control+s')]);
  expect(download.suggestedFilename()).toBe('kestrel-point.mended.glb');
  await page.getByText('on the job card, saved').waitFor();
});

test('a button that can’t be pressed does not look as if it could', async () => {
  const page = await openApp({ address: '?demo' });
  await page.getByText('rotation tracks in').waitFor();
  await page.locator('slew-roster .option').first().click();
  const look = await page.evaluate(() => {
    const roster = document.querySelector('slew-app')?.shadowRoot?.querySelector('slew-roster')?.shadowRoot;
    const made = [false, true].map((disabled) => {
      const button = Object.assign(document.createElement('button'), { className: 'main', disabled });
      roster?.append(button);
      const { backgroundColor, borderStyle } = getComputedStyle(button);
      return { backgroundColor, borderStyle };
    });
    return made;
  });
  expect(look[1].backgroundColor).not.toBe(look[0].backgroundColor);
  expect(look[1].borderStyle).toBe('dotted');
});
