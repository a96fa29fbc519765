import type { Page } from 'playwright';

/** Presses before Tab is held to lead nowhere. */
const MOST_TABS = 120;

/** What the keyboard is on, by what a person reads there: its label or its words. */
export function focused(page: Page): Promise<string> {
  return page.evaluate(() => {
    let at: Element | null = document.activeElement;
    while (at?.shadowRoot?.activeElement) at = at.shadowRoot.activeElement;
    if (!(at instanceof HTMLElement) || at === document.body) return '';
    const labels = at instanceof HTMLInputElement || at instanceof HTMLSelectElement ? at.labels : undefined;
    const words = at.getAttribute('aria-label') ?? labels?.[0]?.textContent ?? at.textContent;
    return words.replaceAll(/\s+/g, ' ').trim();
  });
}

/** Press Tab until the keyboard is on what is called `name`; how many presses it took. */
export async function tabTo(page: Page, name: RegExp | string): Promise<number> {
  const seen: string[] = [];
  for (let presses = 0; presses <= MOST_TABS; presses++) {
    const words = await focused(page);
    if (typeof name === 'string' ? words === name : name.test(words)) return presses;
    seen.push(words);
    await page.keyboard.press('Tab');
  }
  throw new Error(`Tab never comes to ${String(name)}; it went over: ${seen.join(' | ')}`);
}
