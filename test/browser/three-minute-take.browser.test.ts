import { mkdir, writeFile } from 'node:fs/promises';
import { availableParallelism, loadavg } from 'node:os';
import type { Page } from 'playwright';
import { expect, test } from 'vitest';
import { generatedTake, THREE_MINUTES } from '../support/generated-take.js';
import { openApp } from '../support/open-app.js';
import { TASKS, longestTasks } from '../support/page-tasks.js';
import { commandFolder } from '../support/run-command.js';
import { peakOfTabs } from '../support/tab-memory.js';

// 80 joints, 3 minutes, 120 Hz: 1,728,000 keys. Goals from the project's own design: first trace 3 s, roster 5 s, no frame over 50 ms.
const POP = { joint: 40, frame: 9000, degrees: 5 };
const ARTEFACTS = 'test/browser/artefacts';

/** Milliseconds since the file was chosen. */
interface Load {
  chosen?: number;
  trace?: number;
  roster?: number;
  surveyed?: number;
  longestFrame: number;
  frames: number;
  /** Frames over 50 ms by the clock: those also in which the page waited for a processor. */
  slowFrames: number;
  /** Tasks of the page over 50 ms, as the browser itself reports them. */
  longTasks: { at: number; took: number }[];
}

declare global {
  interface Window {
    load: Load;
    surveyed: Promise<void>;
  }
}

// Once more where it fails: a browser's first load also compiles, and its own work counts as the page's.
test(
  'a take of 1.7 million keys is drawn while it loads, and its one-frame pop is seen at full view',
  { retry: 1, timeout: 90_000 },
  async () => {
    const place = await commandFolder();
    await writeFile(place.path('take.glb'), generatedTake({ ...THREE_MINUTES, pop: POP }));
    const page = await openApp({ viewport: { width: 1720, height: 1400 } });
    await page.evaluate(watchLoading);
    const browser = page.context().browser();
    await browser?.startTracing(page, { categories: [...TASKS] });
    await page.locator('input.files').setInputFiles(place.path('take.glb'));
    // Not by a locator, which would search the whole page at every frame.
    await page.evaluate(() => window.surveyed);
    const trace = await browser?.stopTracing();
    // Seconds on a clock say little where others wait for the processor too; at rest this is 1.
    const crowding = Math.max(1, loadavg()[0] / availableParallelism());
    const load = {
      crowding,
      ...(await page.evaluate(() => window.load)),
      longestTasksOfProcessor: longestTasks(String(trace)),
      peakMegabytes: browser ? await peakOfTabs(browser) : undefined,
    };
    await mkdir(ARTEFACTS, { recursive: true });
    await writeFile(`${ARTEFACTS}/three-minute-take.json`, `${JSON.stringify(load, null, 2)}\n`);
    await page.screenshot({ path: `${ARTEFACTS}/three-minute-take.png` });

    const { pop, beside } = await inkAround(page, 'joint-40', POP.frame / THREE_MINUTES.frames);
    expect(pop).toBeGreaterThan(1.5 * beside);
    expect(load.trace).toBeLessThan(3000 * crowding);
    expect(load.roster).toBeLessThan(5000 * crowding);
    // No frame over 50 ms: no task that keeps the page's thread at work for longer. Processor time hardly grows where others are at work,
    // but for the caches that they share: twice at most.
    expect(load.longestTasksOfProcessor[0]).toBeLessThan(crowding > 1.5 ? 100 : 50);
    // The page and its worker, as far as the system tells.
    expect(load.peakMegabytes ?? 0).toBeLessThan(400);
  },
);

/** Runs on the page: from the choice of the file on, notes when what is drawn, every frame and every long task. */
function watchLoading(): void {
  const load: Load = { longestFrame: 0, frames: 0, slowFrames: 0, longTasks: [] };
  window.load = load;
  let done: (() => void) | undefined;
  window.surveyed = new Promise((resolve) => (done = resolve));
  const since = (): number => performance.now() - (load.chosen ?? 0);
  new PerformanceObserver((list) => {
    for (const { startTime, duration } of list.getEntries())
      if (load.chosen !== undefined && !load.surveyed)
        load.longTasks.push({ at: startTime - load.chosen, took: duration });
  }).observe({ type: 'longtask' });
  // oxlint-disable-next-line unicorn/consistent-function-scoping -- this function goes to the page alone
  const inside = (...path: string[]): Element | undefined => {
    let at: Element | null | undefined = document.querySelector('slew-app');
    for (const step of path) at = at?.shadowRoot?.querySelector(step);
    return at ?? undefined;
  };
  const look = (): void => {
    if (!load.trace && inside('slew-chart-page', 'slew-chart', 'path.trace')) load.trace = since();
    const tally = inside('slew-roster', '.tally')?.textContent;
    if (!load.roster && tally?.startsWith('80 tracks') && inside('slew-roster', 'canvas'))
      load.roster = since();
    if (inside('li.ready')) load.surveyed = since();
  };
  const frame = (before: number) => (now: number) => {
    load.frames++;
    load.longestFrame = Math.max(load.longestFrame, now - before);
    if (now - before > 50) load.slowFrames++;
    look();
    if (load.surveyed) done?.();
    else requestAnimationFrame(frame(now));
  };
  addEventListener(
    // Unlike a change event, this one leaves the app's shadow tree.
    'input',
    () => {
      load.chosen ??= performance.now();
      requestAnimationFrame((now) => requestAnimationFrame(frame(now)));
    },
    { capture: true, once: true },
  );
}

/** Ink (opacity summed over the row's height) at a share of a row's width, and the most ink within 40 px of it on both sides. */
async function inkAround(page: Page, track: string, share: number): Promise<{ pop: number; beside: number }> {
  return page.evaluate(
    ({ name, at }) => {
      const root = document.querySelector('slew-app')?.shadowRoot?.querySelector('slew-roster')?.shadowRoot;
      const canvas = root?.querySelector('canvas');
      const rows = [...(root?.querySelectorAll<HTMLElement>('.option') ?? [])];
      const row = rows.find((option) =>
        option.querySelector('.name')?.textContent.trim().startsWith(`${name} `),
      );
      const context = canvas?.getContext('2d');
      if (!canvas || !row || !context) throw new Error(`no row ${name}`);
      const scale = canvas.height / canvas.clientHeight;
      const top = (row.offsetTop - canvas.offsetTop) * scale;
      // Without the row's foot, where carets stand.
      const { data, width, height } = context.getImageData(0, top, canvas.width, 9 * scale);
      const column = (x: number): number => {
        let ink = 0;
        for (let y = 0; y < height; y++) ink += data[4 * (y * width + x) + 3];
        return ink;
      };
      const x = Math.round(at * width);
      const around = Array.from({ length: 81 }, (_, i) => column(x - 40 + i));
      return {
        pop: Math.max(...around.slice(38, 43)),
        beside: Math.max(...around.slice(0, 36), ...around.slice(45)),
      };
    },
    { name: track, at: share },
  );
}
