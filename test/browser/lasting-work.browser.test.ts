import { mkdir, readFile, writeFile } from 'node:fs/promises';
import { kestrelPoint } from '@slewcurve/job';
import type { Page } from 'playwright';
import { expect, test } from 'vitest';
import { generatedTake } from '../support/generated-take.js';
import { openApp } from '../support/open-app.js';
import { commandFolder } from '../support/run-command.js';

/** A page under load may be late. */
const SOON = { timeout: 10_000 };

// Nothing that goes wrong may cost somebody their work.

const LONG = { joints: 60, frames: 12_000, rate: 120 };

/** The demo scene, with one edit on its job card. */
async function openWithAnEdit(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Open the demo scene' }).click();
  await page.getByText('12 rotation tracks in').waitFor();
  await applyFirst(page, 'beetle-ankle');
}

async function applyFirst(page: Page, find: string): Promise<void> {
  await page.getByRole('button', { name: 'Roster: all tracks' }).click();
  await page.getByRole('searchbox', { name: 'Find a track' }).fill(find);
  await page.locator('slew-roster .option').first().click();
  await page.locator('slew-chart .notes button').first().click();
  await page.getByRole('button', { name: 'Apply it' }).click();
  await page.getByText('1 edit on the job card').waitFor();
}

test('a worker that dies in the middle of a survey is said, started again, and takes up files and cards', async () => {
  const place = await commandFolder();
  await writeFile(place.path('long.glb'), generatedTake(LONG));
  const page = await openApp();
  await openWithAnEdit(page);
  await page.locator('input.files').setInputFiles(place.path('long.glb'));
  await page.locator('li.surveying').waitFor();
  await page.workers()[0]?.evaluate(() => self.close());
  await page.getByText('The work behind the page stopped').waitFor({ timeout: 20_000 });
  await page.getByText('60 rotation tracks in').waitFor({ timeout: 60_000 });
  await page.getByText('1 edit on the job card').waitFor();
  expect(await page.locator('li.ready').count()).toBe(2);
}, 90_000);

test('a survey is stopped where somebody says so, the files after it go on, and it can be taken up again', async () => {
  const place = await commandFolder();
  await writeFile(place.path('long.glb'), generatedTake(LONG));
  await writeFile(place.path('next.glb'), generatedTake({ joints: 3, frames: 60, rate: 60 }));
  const page = await openApp();
  await page.locator('input.files').setInputFiles([place.path('long.glb'), place.path('next.glb')]);
  await page.locator('li', { hasText: 'long.glb' }).getByRole('button', { name: 'Stop' }).click();
  await page.getByText('long.glb: stopped').waitFor();
  await page.getByText('3 rotation tracks in').waitFor();
  await page.getByRole('button', { name: 'Go on with long.glb' }).click();
  await page.getByText('60 rotation tracks in').waitFor({ timeout: 60_000 });
  expect(await page.locator('li.ready').count()).toBe(2);
}, 90_000);

test('work survives a reload: it is offered, and taken up with its card', async () => {
  const place = await commandFolder();
  await writeFile(place.path('scene.glb'), kestrelPoint());
  const page = await openApp();
  await page.locator('input.files').setInputFiles(place.path('scene.glb'));
  await page.getByText('12 rotation tracks in').waitFor();
  await applyFirst(page, 'beetle-ankle');
  await page.reload();
  await page.getByText('An earlier visit left 1 edit on scene.glb').waitFor();
  await page.getByRole('button', { name: 'Go on with it' }).click();
  await page.getByText('1 edit on the job card').waitFor();
  expect(await page.locator('li.ready b').allTextContents()).toEqual(['scene.glb']);
});

test('Ctrl+Z takes an edit back, Ctrl+Shift+Z does it again', async () => {
  const page = await openApp();
  await openWithAnEdit(page);
  const edits = page.getByText('1 edit on the job card');
  await page.keyboard.press('Control+z');
  await expect.poll(() => edits.count(), SOON).toBe(0);
  await page.keyboard.press('Control+Shift+z');
  await expect.poll(() => edits.count(), SOON).toBe(1);
});

test('a file is written in place, again after another edit, and is left alone once somebody else changed it', async () => {
  const place = await commandFolder();
  const page = await openApp();
  // The browser's private folder hands out handles of the same kind as its dialogue.
  const name = 'scene.glb';
  await page.evaluate(writeInBrowser, { name, base64: base64(kestrelPoint()) });
  await page.evaluate((file) => {
    const pick = async (): Promise<FileSystemFileHandle[]> => [
      await (await navigator.storage.getDirectory()).getFileHandle(file),
    ];
    Object.assign(window, { showOpenFilePicker: pick });
  }, name);
  await page.getByRole('button', { name: 'Open files' }).click();
  await page.getByText('12 rotation tracks in').waitFor();
  await applyFirst(page, 'beetle-ankle');
  const save = page.getByRole('button', { name: 'Save over scene.glb' });
  await save.click();
  await page.getByText('scene.glb is written.').waitFor();
  await expectCommandsBytes(place, page, name);

  await page.keyboard.press('Control+z');
  await page.getByText('on the job card').waitFor({ state: 'detached' });
  await page.keyboard.press('Control+Shift+z');
  await page.getByText('not saved yet').waitFor();
  await save.click();
  await page.getByText(', saved').waitFor();

  const other = new Uint8Array([...kestrelPoint(), 0, 0, 0, 0]);
  await page.evaluate(writeInBrowser, { name, base64: base64(other) });
  await save.click();
  await page.getByText('was changed on disk since it was opened here; nothing was written').waitFor();
  expect(await page.evaluate(readInBrowser, name)).toBe(base64(other));
});

test('a dropped folder is opened whole: a .gltf finds its .bin, and files of one name are told apart', async () => {
  const place = await commandFolder();
  await mkdir(place.path('shots/left'), { recursive: true });
  await mkdir(place.path('shots/right'));
  for (const side of ['left', 'right'])
    await writeFile(place.path(`shots/${side}/walk.glb`), generatedTake({ joints: 3, frames: 60, rate: 60 }));
  await writeFile(place.path('walk.glb'), generatedTake({ joints: 3, frames: 60, rate: 60 }));
  await writeGltfWithBin(place.path('shots/left'));
  const page = await openApp();
  const cdp = await page.context().newCDPSession(page);
  const files = [place.path('shots'), place.path('walk.glb')];
  for (const type of ['dragEnter', 'dragOver', 'drop'] as const)
    await cdp.send('Input.dispatchDragEvent', {
      type,
      x: 300,
      y: 300,
      data: { items: [], files, dragOperationsMask: 1 },
    });
  await expect.poll(() => page.locator('li.ready').count(), { timeout: 15_000 }).toBe(4);
  const names = await page.locator('li.ready b').allTextContents();
  expect(names.toSorted()).toEqual([
    'shots/left/turn.gltf',
    'shots/left/walk.glb',
    'shots/right/walk.glb',
    'walk.glb',
  ]);
  await page.locator('input.files').setInputFiles(place.path('walk.glb'));
  await page.getByText('walk (2).glb').first().waitFor();
});

/** The bytes in the browser's folder against those of the command, by the page's own card. */
async function expectCommandsBytes(
  place: Awaited<ReturnType<typeof commandFolder>>,
  page: Page,
  name: string,
): Promise<void> {
  await page.getByRole('button', { name: 'Docket: report' }).click();
  const download = page.waitForEvent('download');
  await page.getByRole('button', { name: 'Save the job card as JSON' }).click();
  await writeFile(place.path('card.json'), await readFile(await (await download).path()));
  await writeFile(place.path(name), kestrelPoint());
  await place.run('mend', name, '--card', 'card.json', '-o', 'out.glb');
  const written = await page.evaluate(readInBrowser, name);
  expect(written === base64(await readFile(place.path('out.glb')))).toBe(true);
}

async function writeGltfWithBin(folder: string): Promise<void> {
  const floats = Float32Array.of(0, 1, 0, 0, 0, 1, 0, Math.SQRT1_2, 0, Math.SQRT1_2);
  await writeFile(`${folder}/turn.bin`, new Uint8Array(floats.buffer));
  const gltf = {
    asset: { version: '2.0' },
    nodes: [{ name: 'door' }],
    buffers: [{ uri: 'turn.bin', byteLength: 40 }],
    bufferViews: [
      { buffer: 0, byteLength: 8 },
      { buffer: 0, byteOffset: 8, byteLength: 32 },
    ],
    accessors: [
      { bufferView: 0, componentType: 5126, count: 2, type: 'SCALAR', min: [0], max: [1] },
      { bufferView: 1, componentType: 5126, count: 2, type: 'VEC4' },
    ],
    animations: [
      {
        samplers: [{ input: 0, output: 1 }],
        channels: [{ sampler: 0, target: { node: 0, path: 'rotation' } }],
      },
    ],
  };
  await writeFile(`${folder}/turn.gltf`, JSON.stringify(gltf));
}

// Bytes go to the page and back as text: lists of numbers take seconds.
function base64(bytes: Uint8Array): string {
  return Buffer.from(bytes).toString('base64');
}

async function writeInBrowser({ name, base64: text }: { name: string; base64: string }): Promise<void> {
  const folder = await navigator.storage.getDirectory();
  const out = await (await folder.getFileHandle(name, { create: true })).createWritable();
  await out.write(Uint8Array.from(atob(text), (letter) => letter.charCodeAt(0)));
  await out.close();
}

async function readInBrowser(name: string): Promise<string> {
  const folder = await navigator.storage.getDirectory();
  const file = await (await folder.getFileHandle(name)).getFile();
  const bytes = new Uint8Array(await file.arrayBuffer());
  return btoa(Array.from(bytes, (byte) => String.fromCharCode(byte)).join(''));
}
