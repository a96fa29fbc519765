import '@slewcurve/elements/define/porthole';
import { SlewPorthole } from '@slewcurve/elements/porthole';
import { beforeEach, describe, expect, test } from 'vitest';
import { page, userEvent } from 'vitest/browser';
import { axeFindings, heard, settled, show } from '../support/axe-clean.js';
import { chartOf, popped } from '../support/tracks-for-elements.js';

const porthole = async (more: Partial<SlewPorthole> = {}): Promise<SlewPorthole> =>
  show(new SlewPorthole(), { data: chartOf(popped(), { frameRate: 30 }), time: 0.55, ...more });

beforeEach(() => page.viewport(800, 900));

describe('the 3-D view', () => {
  test('has a name, words for what it shows, and buttons that say what they do', async () => {
    await porthole();
    await expect
      .element(page.getByRole('application', { name: '3-D view of hand: arrow keys look round' }))
      .toHaveAccessibleDescription(
        'At 0.55 s own y points straight up, own z points 55° right of ahead; it turns at 100 deg/s about parent y.',
      );
    for (const name of ['Play', 'A frame back', 'A frame on'])
      await expect.element(page.getByRole('button', { name, exact: true })).toBeInTheDocument();
    await expect
      .element(page.getByRole('slider', { name: 'Time' }))
      .toHaveAttribute('aria-valuetext', '0.55 s');
  });

  test('is clean for axe, light and dark', async () => {
    expect(await axeFindings(await porthole({ camera: true }))).toEqual([]);
    expect(await axeFindings(await show(new SlewPorthole(), {}))).toEqual([]);
  });

  test('goes a frame on and back, on the grid', async () => {
    const element = await porthole({ time: 0.5 });
    await page.getByRole('button', { name: 'A frame on' }).click();
    expect(element.time).toBeCloseTo(16 / 30, 9);
    await page.getByRole('button', { name: 'A frame back' }).click();
    expect(element.time).toBeCloseTo(15 / 30, 9);
  });

  test('plays only when asked, at the speed chosen, and stops at the end', async () => {
    const element = await porthole({ time: 2.9 });
    const times = heard(element, 'time-changed');
    const states = heard(element, 'playing-changed');
    await settled(element);
    expect(times).toEqual([]);
    element.speed = 4;
    await page.getByRole('button', { name: 'Play', exact: true }).click();
    await expect.poll(() => element.playing).toBe(false);
    expect(element.time).toBe(3);
    expect(states).toEqual([{ playing: true }, { playing: false }]);
  });

  test('is looked round by arrow keys, and put back by a button', async () => {
    const element = await porthole();
    const { round } = element.view;
    element.renderRoot.querySelector<HTMLElement>('.globe')?.focus();
    await userEvent.keyboard('{ArrowRight}');
    expect(element.view.round).toBe(round + 10);
    await page.getByRole('button', { name: 'Look from the first place' }).click();
    expect(element.view.round).toBe(round);
  });

  test('draws: another moment is another picture, the same moment the same', async () => {
    const element = await porthole();
    const picture = (): string => element.renderRoot.querySelector('canvas')?.toDataURL() ?? '';
    const first = picture();
    element.time = 0.9;
    await settled(element);
    const second = picture();
    element.time = 0.55;
    await settled(element);
    expect(second).not.toBe(first);
    expect(picture()).toBe(first);
  });
});
