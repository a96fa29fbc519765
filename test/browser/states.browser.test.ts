import { mkdir, writeFile } from 'node:fs/promises';
import axe from 'axe-core';
import type { Page } from 'playwright';
import { expect, test } from 'vitest';
import { generatedTake } from '../support/generated-take.js';
import { openApp } from '../support/open-app.js';
import { commandFolder } from '../support/run-command.js';

// Every state that the page can be in: nothing for axe to find, light and dark, and a picture of each, also 360 px wide.

const ARTEFACTS = 'test/browser/artefacts';

declare global {
  interface Window {
    /** Once its source has run on the page. */
    axe: typeof axe;
  }
}

interface State {
  readonly name: string;
  readonly reach: (page: Page, place: Awaited<ReturnType<typeof commandFolder>>) => Promise<void>;
  /** True as long as the page is still in this state. */
  readonly holds?: (page: Page) => Promise<boolean>;
}

const demo = async (page: Page): Promise<void> => {
  await page.getByRole('button', { name: 'Open the demo scene' }).click();
  await page.getByText('12 rotation tracks in').waitFor();
};

const chartOf = async (page: Page, find: string): Promise<void> => {
  await page.getByRole('searchbox', { name: 'Find a track' }).fill(find);
  await page.locator('slew-roster .option').first().click();
  await page.locator('slew-chart path.trace').first().waitFor();
};

const STATES: readonly State[] = [
  { name: 'empty', reach: async () => {} },
  {
    name: 'loading',
    async reach(page, place) {
      const take = generatedTake({ joints: 60, frames: 12_000, rate: 120 });
      for (const name of ['walk.glb', 'run.glb']) await writeFile(place.path(name), take);
      await page.locator('input.files').setInputFiles([place.path('walk.glb'), place.path('run.glb')]);
      await page.locator('slew-roster canvas').waitFor();
    },
    holds: async (page) => (await page.locator('li.opening, li.surveying').count()) > 0,
  },
  {
    name: 'broken file',
    async reach(page, place) {
      await writeFile(place.path('broken.glb'), 'glTF, but no more than that');
      const take = generatedTake({ joints: 6, frames: 240, rate: 60 });
      await writeFile(place.path('whole.glb'), take);
      await page.locator('input.files').setInputFiles([place.path('broken.glb'), place.path('whole.glb')]);
      await page.getByRole('alert').waitFor();
      await page.getByText('6 rotation tracks in').waitFor();
    },
  },
  { name: 'roster', reach: demo },
  {
    name: 'chart',
    async reach(page) {
      await demo(page);
      await chartOf(page, 'crane-head');
    },
  },
  {
    name: 'close-up',
    async reach(page) {
      await demo(page);
      await chartOf(page, 'beetle-ankle');
      await page.getByRole('button', { name: /^Open a close-up/ }).click();
      await page.locator('slew-close-up path.trace').first().waitFor();
    },
  },
  {
    name: 'sentence open',
    async reach(page) {
      await demo(page);
      await chartOf(page, 'beetle-ankle');
      await page.locator('slew-chart .notes button').first().click();
      await page.getByRole('button', { name: 'Apply it' }).waitFor();
    },
  },
  {
    name: '2,000 findings',
    async reach(page, place) {
      const pop = { joint: 'every', frame: 30, degrees: 8 } as const;
      const crowd = generatedTake({ joints: 2000, frames: 60, rate: 60, pop, flat: true });
      await writeFile(place.path('crowd.glb'), crowd);
      await page.locator('input.files').setInputFiles(place.path('crowd.glb'));
      await page.getByText('2,000 rotation tracks in').waitFor({ timeout: 60_000 });
    },
  },
  {
    name: 'docket',
    async reach(page) {
      await demo(page);
      await page.getByRole('button', { name: 'Mend all that is proposed' }).click();
      await page.getByText('on the job card').waitFor();
      await page.getByRole('button', { name: 'Docket: report' }).click();
    },
  },
];

test.for(STATES)(
  'axe finds nothing: $name',
  { timeout: 90_000 },
  async ({ name, reach, holds = () => Promise.resolve(true) }) => {
    const place = await commandFolder();
    const page = await openApp({ viewport: { width: 1280, height: 900 }, reducedMotion: 'reduce' });
    await reach(page, place);
    const found: string[] = [];
    await page.evaluate(axe.source);
    for (const colorScheme of ['light', 'dark'] as const) {
      await page.emulateMedia({ colorScheme });
      await picture(page, `${name}, ${colorScheme}`);
      // The dark page differs from the light one in its colours alone.
      const rules = colorScheme === 'dark' ? ['color-contrast'] : undefined;
      found.push(...(await axeFindings(page, rules)).map((finding) => `${colorScheme}: ${finding}`));
    }
    await page.emulateMedia({ colorScheme: 'light' });
    await page.setViewportSize({ width: 360, height: 740 });
    await picture(page, `${name}, 360 px`);
    found.push(...(await axeFindings(page)).map((finding) => `360 px: ${finding}`));
    expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBe(360);
    expect(found).toEqual([]);
    expect(await holds(page)).toBe(true);
  },
);

async function picture(page: Page, name: string): Promise<void> {
  await mkdir(ARTEFACTS, { recursive: true });
  await page.screenshot({ path: `${ARTEFACTS}/${name}.png`, fullPage: true });
}

/** What axe finds on the whole page, shadow trees and all, by all rules or some: a line for each node. */
async function axeFindings(page: Page, rules?: string[]): Promise<string[]> {
  const { violations } = await page.evaluate(
    (runOnly) => window.axe.run({ resultTypes: ['violations'], ...(runOnly && { runOnly }) }),
    rules,
  );
  return violations.flatMap(({ id, nodes }) =>
    nodes.map(({ target, failureSummary }) => `${id}: ${target.join(' ')} ${failureSummary ?? ''}`),
  );
}
