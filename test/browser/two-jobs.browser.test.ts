import { readFile, writeFile } from 'node:fs/promises';
import { kestrelPoint } from '@slewcurve/job';
import type { Page } from 'playwright';
import { describe, expect, test } from 'vitest';
import { focused, tabTo } from '../support/by-keyboard.js';
import { openApp } from '../support/open-app.js';
import { commandFolder } from '../support/run-command.js';
import { sharedFile } from '../support/shared-data.js';

/** A page under load may be late. */
const SOON = { timeout: 10_000 };

// The page's work against the command's: the same job card must give the same bytes.

/** One track, and the buttons of the remedies to take on it, in order. */
interface Mending {
  /** What is typed to find it. */
  readonly find: string;
  readonly remedies: readonly RegExp[];
}

interface Job {
  readonly name: string;
  readonly file: string;
  readonly absent: boolean;
  readonly bytes: () => Uint8Array;
  readonly mendings: readonly Mending[];
  /** What a newcomer does by mouse, from opening the file to the saved one, searches among it; at most 12 for both knees. */
  readonly actions: number;
}

const adventurer = sharedFile('data/gltf/animation-only/adventurer-9clips.glb');
const cube = sharedFile('data/gltf/animation-only/spinning-cube.glb');

const JOBS: readonly Job[] = [
  {
    name: 'both knees of the adventurer',
    file: 'adventurer-9clips.glb',
    absent: adventurer.absent,
    bytes: () => adventurer.read(),
    mendings: [
      { find: 'lowerleg.l 1H_Melee_Attack_Chop', remedies: [/^Bridge key 20\b/] },
      { find: 'lowerleg.r 1H_Melee_Attack_Chop', remedies: [/^Bridge key 20\b/] },
    ],
    actions: 11,
  },
  {
    name: 'both half turns of the cube',
    file: 'spinning-cube.glb',
    absent: cube.absent,
    bytes: () => cube.read(),
    mendings: [
      { find: 'AnimatedCube', remedies: [/^Choose the side of key 1\b/, /^Choose the side of key \d\b/] },
    ],
    actions: 8,
  },
  {
    name: 'the shelf of an ankle and the half turns of a lens',
    file: 'kestrel-point.glb',
    absent: false,
    bytes: kestrelPoint,
    mendings: [
      { find: 'beetle-ankle', remedies: [/^Bridge key 22\b/] },
      {
        find: 'lens-halves',
        remedies: [/^Choose the side of key 1\b/, /^Choose the side of key \d\b/],
      },
    ],
    actions: 13,
  },
];

describe.each(JOBS)('$name', ({ file, absent, bytes, mendings, actions }) => {
  const edits = mendings.reduce((sum, { remedies }) => sum + remedies.length, 0);

  test.skipIf(absent)('are mended by mouse, to the bytes that the command writes', async () => {
    const place = await commandFolder();
    await writeFile(place.path(file), bytes());
    const page = await openApp();
    await page.locator('input.files').setInputFiles(place.path(file));
    // Opening it was the first.
    let taken = 1;
    const act = async (doing: Promise<void>): Promise<void> => {
      taken++;
      await doing;
    };
    for (const [at, { find, remedies }] of mendings.entries()) {
      if (at > 0) await act(page.getByRole('button', { name: 'Roster: all tracks' }).click());
      await act(page.getByRole('searchbox', { name: 'Find a track' }).fill(find));
      await act(page.locator('slew-roster .option').first().click());
      for (const remedy of remedies) {
        await act(page.getByRole('button', { name: remedy }).first().click());
        await act(page.getByRole('button', { name: 'Apply it' }).click());
        await page.getByRole('region', { name: 'The edit, in a sentence' }).waitFor({ state: 'detached' });
      }
    }
    await page.getByText(`${edits} edit${edits === 1 ? '' : 's'} on the job card`).waitFor();
    const saved = await downloadOf(page, () =>
      act(page.getByRole('button', { name: 'Save a mended copy' }).click()),
    );
    expect(taken).toBe(actions);
    await page.getByRole('button', { name: 'Docket: report' }).click();
    const card = await downloadOf(page, () =>
      page.getByRole('button', { name: 'Save the job card as JSON' }).click(),
    );
    expect(JSON.parse(card.toString()).steps).toHaveLength(edits);
    await expectTheCommandAgrees(place, file, card, saved);
  });

  test.skipIf(absent)('are mended by keyboard alone, to the bytes that the command writes', async () => {
    const place = await commandFolder();
    await writeFile(place.path(file), bytes());
    const page = await openApp({ withoutHandles: true });
    await openByKeyboard(page, place.path(file));
    for (const { find, remedies } of mendings) {
      await findByKeyboard(page, find);
      for (const remedy of remedies) await applyByKeyboard(page, remedy);
    }
    const saved = await downloadOf(page, async () => {
      await tabTo(page, 'Save a mended copy');
      await page.keyboard.press('Enter');
    });
    await tabTo(page, 'Docket: report');
    await page.keyboard.press('Enter');
    const card = await downloadOf(page, async () => {
      await tabTo(page, 'Save the job card as JSON');
      await page.keyboard.press('Enter');
    });
    expect(JSON.parse(card.toString()).steps).toHaveLength(edits);
    await expectTheCommandAgrees(place, file, card, saved);
  });
});

async function openByKeyboard(page: Page, path: string): Promise<void> {
  await tabTo(page, 'Open files');
  const chooser = page.waitForEvent('filechooser');
  await page.keyboard.press('Enter');
  await (await chooser).setFiles(path);
  await page.getByText(/rotation tracks? in/).waitFor();
}

/** `/`, a few letters, Enter: the chart of the best match, with the keyboard on its trace. */
async function findByKeyboard(page: Page, find: string): Promise<void> {
  if ((await focused(page)).startsWith('Cursor on the trace')) {
    await tabTo(page, 'Roster: all tracks');
    await page.keyboard.press('Enter');
  }
  await page.keyboard.press('/');
  await page.keyboard.type(find);
  await page.keyboard.press('Enter');
}

/** Page Down to the finding, Ctrl+Enter for its remedy, Ctrl+Enter to apply it. */
async function applyByKeyboard(page: Page, remedy: RegExp): Promise<void> {
  await expect.poll(() => focused(page), SOON).toMatch(/^Cursor on the trace/);
  const chosen = page.locator('slew-chart li.chosen button').first();
  for (let pressed = 0; pressed < 20; pressed++) {
    await page.keyboard.press('PageDown');
    if (remedy.test(await chosen.textContent().then((text) => text?.trim() ?? ''))) break;
  }
  await page.keyboard.press('Control+Enter');
  await page.getByRole('button', { name: 'Apply it' }).waitFor();
  await page.keyboard.press('Control+Enter');
  await page.getByRole('region', { name: 'The edit, in a sentence' }).waitFor({ state: 'detached' });
}

async function downloadOf(page: Page, ask: () => Promise<void>): Promise<Buffer> {
  const download = page.waitForEvent('download');
  await ask();
  return readFile(await (await download).path());
}

async function expectTheCommandAgrees(
  place: Awaited<ReturnType<typeof commandFolder>>,
  file: string,
  card: Buffer,
  saved: Buffer,
): Promise<void> {
  await writeFile(place.path('card.json'), card);
  const ran = await place.run('mend', file, '--card', 'card.json', '-o', 'out.glb');
  expect(ran.stderr).not.toContain('error');
  expect(saved.equals(await readFile(place.path('out.glb')))).toBe(true);
}
