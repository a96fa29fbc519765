import { readFile, writeFile } from 'node:fs/promises';
import { availableParallelism, loadavg } from 'node:os';
import { kestrelPoint } from '@slewcurve/job';
import type { Step } from '@slewcurve/mend';
import type { Page } from 'playwright';
import { expect, test } from 'vitest';
import { focused, tabTo } from '../support/by-keyboard.js';
import { generatedTake } from '../support/generated-take.js';
import { openApp } from '../support/open-app.js';
import { TASKS, longestTasks } from '../support/page-tasks.js';
import { commandFolder } from '../support/run-command.js';

// Edits by hand on one page, by mouse, by finger and by the keyboard alone: each is a sentence, one line of the job card, one undo; and
// the command makes the same bytes of the card.

const SENTENCE = { name: 'The edit, in a sentence' };

// Seven edits are surveyed anew each: a busy machine takes its time.
const LONG = { timeout: 150_000 };

test(
  'presses, limits, holds and keys are made by mouse, finger and keyboard, and the command agrees',
  LONG,
  async () => {
    const place = await commandFolder();
    await writeFile(place.path('kestrel-point.glb'), kestrelPoint());
    const page = await openApp({
      viewport: { width: 1280, height: 1700 },
      hasTouch: true,
      reducedMotion: 'reduce',
    });
    await page.locator('input.files').setInputFiles(place.path('kestrel-point.glb'));
    await page.getByText('12 rotation tracks in').waitFor();
    await page.getByRole('searchbox', { name: 'Find a track' }).fill('scope-pass');
    await page.locator('slew-roster .option').first().click();
    await page.locator('slew-chart .grip.press').waitFor();

    await pressByMouse(page);
    await pressByFinger(page);
    await limitByKeyboard(page);
    await holdByKeyboard(page);
    await keysInTheCloseUp(page);
    await drawByMouse(page);
    await turnOnTheGlobe(page);

    await page.getByRole('button', { name: 'Docket: report' }).click();
    const card = await download(page, 'Save the job card as JSON');
    const { steps }: { readonly steps: readonly Step[] } = JSON.parse(card.toString());
    expect(steps.map(({ verb, ends }) => `${verb} ${ends ?? ''}`.trim())).toEqual([
      'shape run',
      'cap',
      'hold',
      'shape run',
      'set marks',
      'shape',
      'lay over',
    ]);
    expect(steps.at(-1)).toMatchObject({ turn: [0, 1.1, 0], about: 'parent' });
    const saved = await download(page, 'Save a mended copy');
    await writeFile(place.path('card.json'), card);
    const ran = await place.run('mend', 'kestrel-point.glb', '--card', 'card.json', '-o', 'out.glb');
    expect(ran.stderr).not.toContain('error');
    expect(saved.equals(await readFile(place.path('out.glb')))).toBe(true);
  },
);

test(
  'a press that rests on a take of 21,600 keys is tried behind the page, which is never held up',
  LONG,
  async () => {
    const place = await commandFolder();
    await writeFile(place.path('take.glb'), generatedTake({ joints: 1, frames: 21_600, rate: 120 }));
    const page = await openApp({ viewport: { width: 1280, height: 900 }, reducedMotion: 'reduce' });
    await page.locator('input.files').setInputFiles(place.path('take.glb'));
    await page.locator('li.ready').waitFor();
    await page.locator('slew-roster .option').first().click();
    await page.locator('slew-chart .grip.press').waitFor();
    const [x, y] = await onTrace(page, 12);
    await page.mouse.move(x, y);
    await page.mouse.down();
    for (let i = 1; i <= 5; i++) await page.mouse.move(x, y - 5 * i);
    const browser = page.context().browser();
    const exact = page.locator('slew-sentence .price', { hasText: 'It costs no time' });
    await browser?.startTracing(page, { categories: [...TASKS] });
    await page.mouse.up();
    await exact.waitFor();
    for (let i = 0; i < 3; i++) await page.keyboard.press('ArrowUp');
    await exact.waitFor();
    await page.locator('slew-chart ol path.before').first().waitFor();
    const [longest] = longestTasks(String(await browser?.stopTracing()));
    // Processor time hardly grows where others are at work, but for the caches that they share: twice at most.
    expect(longest).toBeLessThan(loadavg()[0] > 1.5 * availableParallelism() ? 100 : 50);
  },
);

/** The trace bulges under the mouse, tells what it borrows, and is let go by Escape; once more, and it is a sentence. */
async function pressByMouse(page: Page): Promise<void> {
  const [x, y] = await onTrace(page, 28);
  const before = await odometer(page);
  const drag = async (): Promise<void> => {
    await page.mouse.move(x, y);
    await page.mouse.down();
    for (let i = 1; i <= 5; i++) await page.mouse.move(x, y - 5 * i);
  };
  await drag();
  await expect
    .poll(() => price(page))
    .toMatch(/^\+1\d(\.\d)? deg\/s · \d+(\.\d+)?° borrowed, no time added$/);
  expect(await page.locator('slew-chart .lent').count()).toBeGreaterThanOrEqual(2);
  await expect
    .poll(() => page.locator('slew-chart .lent-words').first().textContent())
    .toMatch(/^\d.*° from \d/);
  // The angle of the whole stays: it is borrowed from the neighbourhood.
  expect(await odometer(page)).toEqual(before);
  await page.keyboard.press('Escape');
  await expect.poll(() => page.locator('slew-chart .lent').count()).toBe(0);
  await page.mouse.up();
  await drag();
  await page.mouse.up();
  await page.getByRole('region', SENTENCE).waitFor();
  expect(await sentence(page)).toMatch(
    /^Shape the speed of all keys of \S+scope in scope-pass, at 28(\.\d+)? s, pressed by 1\d(\.\d)? deg\/s, reaching 0\.714 s, with the same ends, between /,
  );
  await expect.poll(() => focused(page)).toMatch(/^Speed pressed at 28/);
  await page.keyboard.press('Escape');
  await page.getByRole('region', SENTENCE).waitFor({ state: 'detached' });
}

/** By finger the handle at the cursor is drawn; let run, time is saved and the last odometer stays. A number is typed, then it is applied. */
async function pressByFinger(page: Page): Promise<void> {
  await page.getByRole('radio', { name: 'let time run' }).check();
  const [x, y] = await onTrace(page, 33);
  await page.touchscreen.tap(x, y + 30);
  const { x: left, y: top } = await boxOf(page, 'slew-chart .grip.press');
  const finger = await page.context().newCDPSession(page);
  const touch = (type: 'touchStart' | 'touchMove' | 'touchEnd', up = 0): Promise<unknown> =>
    finger.send('Input.dispatchTouchEvent', {
      type,
      touchPoints: type === 'touchEnd' ? [] : [{ x: left + 22, y: top + 22 - up }],
    });
  const before = await odometer(page);
  await touch('touchStart');
  for (let i = 1; i <= 5; i++) await touch('touchMove', 5 * i);
  await expect.poll(() => price(page)).toMatch(/^\+1\d(\.\d)? deg\/s · −0\.\d+ s$/);
  // What follows comes earlier, so that more is turned by each row's end; the last row ends as it did.
  const during = await odometer(page);
  expect(during.slice(0, 3)).toEqual(before.slice(0, 3));
  expect(during.at(-1)).toBe(before.at(-1));
  expect(during[3]).not.toBe(before[3]);
  await touch('touchEnd');
  await page.getByRole('region', SENTENCE).waitFor();
  const slot = page.getByRole('textbox', { name: 'by, speed in degrees a second' });
  await slot.fill('12');
  await slot.press('Enter');
  await expect.poll(() => price(page)).toMatch(/^\+12 deg\/s/);
  await page.getByRole('button', { name: 'Apply it' }).click();
  await page.getByText('1 edit on the job card').waitFor();
}

/** By keyboard: a button begins at the cursor, arrows draw the line, the price is said, Enter takes it, Ctrl+Z gives it back at once. */
async function limitByKeyboard(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Lower a limit' }).focus();
  await page.keyboard.press('Enter');
  await expect.poll(() => focused(page)).toBe('Limit of the speed');
  const line = page.locator('slew-chart .grip.limit.at-work');
  const limit = (): Promise<number> => line.getAttribute('aria-valuenow').then(Number);
  const lower = async (key: string): Promise<void> => {
    const before = await limit();
    await page.keyboard.press(key);
    await expect.poll(limit).toBeLessThan(before);
  };
  while ((await limit()) > 34) await lower('Shift+ArrowDown');
  while ((await limit()) > 31) await lower('ArrowDown');
  await expect
    .poll(() => line.getAttribute('aria-valuetext'))
    .toMatch(/^at most 30(\.\d)? deg\/s|31 deg\/s, \+0\.\d+ s$/);
  await page.keyboard.press('Enter');
  await page.getByText('2 edits on the job card').waitFor();
  await expect.poll(() => focused(page)).toMatch(/^Cursor on the trace/);
  await page.keyboard.press('Control+z');
  await page.getByText('1 edit on the job card').waitFor();
  await page.keyboard.press('Control+Shift+Z');
  await page.getByText('2 edits on the job card').waitFor();
}

async function holdByKeyboard(page: Page): Promise<void> {
  await tabTo(page, 'Put a hold');
  await page.keyboard.press('Enter');
  await expect.poll(() => focused(page)).toMatch(/^Hold at /);
  await page.keyboard.press('Shift+ArrowRight');
  // Half a second and ten frames of 40 ms.
  await expect.poll(() => price(page)).toMatch(/^900 ms still · \+0\.\d+ s|\+1\.\d+ s$/);
  await page.keyboard.press('Enter');
  await page.getByText('3 edits on the job card').waitFor();
}

/** One key's knob sets its speed, its post its time; never both. */
async function keysInTheCloseUp(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Open a close-up here' }).click();
  const key = await page.locator('slew-close-up text.key.here').textContent();
  await dragBy(page, `slew-close-up [data-grip="knob-${Number(key) - 3}"]`, 12, 0, -30);
  expect(await sentence(page)).toMatch(
    /^Shape the speed of .*, letting time run, .*with shoulders of 0\.16 s\.$/,
  );
  await page.keyboard.press('Enter');
  await page.getByText('4 edits on the job card').waitFor();
  await dragBy(page, `slew-close-up [data-grip="post-${Number(key) - 2}"]`, 8, 5, 0);
  expect(await sentence(page)).toMatch(/^Set marks on .*, with \S+ s at \S+ s, moving its keys, between /);
  await page.keyboard.press('Enter');
  await page.getByText('5 edits on the job card').waitFor();
}

/** While a speed is drawn, any stroke on the paper draws; the points that are left, and what they are scaled by, are said. */
async function drawByMouse(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Close the close-up' }).click();
  await page.getByRole('button', { name: 'Draw the speed' }).click();
  await expect.poll(() => focused(page)).toMatch(/^Drawn speed at /);
  const { x, y } = await boxOf(page, 'slew-chart .grip.draw');
  const before = await odometer(page);
  await page.mouse.move(x - 20, y + 10);
  await page.mouse.down();
  for (let i = 1; i <= 5; i++) await page.mouse.move(x - 20 + 12 * i, y + 10 - 3 * i);
  await page.mouse.up();
  await page.getByRole('region', SENTENCE).waitFor();
  expect(await price(page)).toMatch(/^\d+ points, ×\d\S* · no time added$/);
  expect(await page.locator('slew-chart .grip.draw').getAttribute('aria-valuetext')).toMatch(
    /^drawn with \d+ points, within .* deg\/s of the hand, times \d\S* to turn as far as before, no time added$/,
  );
  expect(await sentence(page)).toMatch(/^Shape the speed of .*, drawn through \S+ deg\/s at .*, between /);
  expect((await odometer(page)).at(-1)).toBe(before.at(-1));
  await page.keyboard.press('Enter');
  await page.getByText('6 edits on the job card').waitFor();
}

/** A drag on the globe turns the key about the axes that the switch says; Escape lets go; the arrows turn by 0.1°. */
async function turnOnTheGlobe(page: Page): Promise<void> {
  await page.getByRole('radio', { name: /^turns key \d+$/ }).check();
  await page.getByRole('radio', { name: 'parent’s axes' }).check();
  const globe = await boxOf(page, 'slew-porthole .globe');
  await page.mouse.move(globe.x + 100, globe.y + 100);
  await page.mouse.down();
  for (let i = 1; i <= 4; i++) await page.mouse.move(globe.x + 100 + 10 * i, globe.y + 100);
  await expect
    .poll(() => page.locator('slew-key-turn .now').textContent())
    .toMatch(/^\s*Key \d+ at \S+ s: [23]\d(\.\d)?° about the parent’s y\.\s*$/);
  await page.mouse.up();
  await page.getByRole('region', SENTENCE).waitFor();
  expect(await sentence(page)).toMatch(
    /^Lay a turn over key \d+ of .*, of \(0, [23]\d(\.\d)?, 0\)°, about its parent's axes\.$/,
  );
  await page.locator('slew-porthole .globe').focus();
  await page.keyboard.press('Escape');
  await page.getByRole('region', SENTENCE).waitFor({ state: 'detached' });
  await page.locator('slew-porthole .globe').focus();
  await page.keyboard.press('Shift+ArrowRight');
  await page.keyboard.press('ArrowRight');
  await expect.poll(() => sentence(page)).toContain('of (0, 1.1, 0)°');
  await page.keyboard.press('Enter');
  await page.getByText('7 edits on the job card').waitFor();
}

/** A point on the drawn trace of the chart, at a time; ten seconds a row. */
async function onTrace(page: Page, time: number): Promise<readonly [number, number]> {
  const row = page.locator('slew-chart li.row').nth(Math.floor(time / 10));
  await row.scrollIntoViewIfNeeded();
  const paper = await row.locator('.sheet').boundingBox();
  if (!paper) throw new Error('There is no such row.');
  const x = ((time % 10) / 10) * paper.width;
  const y = await row
    .locator('path.trace')
    .first()
    .evaluate((path, at) => {
      const points = [...(path.getAttribute('d') ?? '').matchAll(/[ML]([\d.]+) ([\d.]+)/g)];
      const near = points.find(([, px]) => Number(px) >= at);
      return Number(near?.[2]);
    }, x);
  return [paper.x + x, paper.y + y];
}

async function dragBy(page: Page, selector: string, middle: number, dx: number, dy: number): Promise<void> {
  const { x, y } = await boxOf(page, selector);
  await page.mouse.move(x + middle, y + middle);
  await page.mouse.down();
  for (let i = 1; i <= 5; i++) await page.mouse.move(x + middle + (dx * i) / 5, y + middle + (dy * i) / 5);
  await page.mouse.up();
  await page.getByRole('region', SENTENCE).waitFor();
}

async function boxOf(page: Page, selector: string): Promise<{ readonly x: number; readonly y: number }> {
  // A mouse reaches what is in sight alone.
  await page.locator(selector).first().scrollIntoViewIfNeeded();
  const box = await page.locator(selector).first().boundingBox();
  if (!box) throw new Error(`${selector} is not on the page.`);
  return box;
}

function price(page: Page): Promise<string> {
  return page
    .locator('slew-chart text.price')
    .first()
    .textContent()
    .then((text) => text ?? '');
}

/** What stands at the ends of the rows. */
async function odometer(page: Page): Promise<string[]> {
  const carried = await page.locator('slew-chart .carried').allTextContents();
  return carried.map((text) => /[\d.,]+°/.exec(text)?.[0] ?? '');
}

/** The sentence with what stands in its slots. */
function sentence(page: Page): Promise<string> {
  return page.locator('slew-sentence .sentence p').evaluate((words) =>
    [...words.childNodes]
      .filter((node) => !(node instanceof Comment))
      .map((node) => (node instanceof HTMLInputElement ? node.value : (node.textContent ?? '')))
      .join('')
      .replaceAll(/\s+/g, ' ')
      .trim(),
  );
}

async function download(page: Page, button: string): Promise<Buffer> {
  const waited = page.waitForEvent('download');
  await page.getByRole('button', { name: button }).click();
  return readFile(await (await waited).path());
}
