import '@slewcurve/elements/define/chart';
import { playAs } from '@slewcurve/core';
import { SlewChart } from '@slewcurve/elements/chart';
import { curveMotion, type MarginNote } from '@slewcurve/elements/plot';
import { beforeEach, describe, expect, test } from 'vitest';
import { page, userEvent } from 'vitest/browser';
import { axeFindings, heard, settled, show } from '../support/axe-clean.js';
import { chartOf, popped, turning } from '../support/tracks-for-elements.js';

const note = (id: string, time: number, more: Partial<MarginNote> = {}): MarginNote => ({
  id,
  rule: 'jump.lone-key',
  level: 'warning',
  message: `Key ${Math.round(time * 10)} stands 5.0° off its neighbours.`,
  time,
  places: [{ time, span: [time - 0.1, time + 0.1], level: more.level ?? 'warning' }],
  count: 1,
  status: 'open',
  remedy: { sentence: 'On hand in Wave, lift out key 12.', button: `Lift out key ${Math.round(time * 10)}` },
  ...more,
});
const NOTES = [
  note('pop', 1.2),
  note('bad', 2.5, { level: 'error' }),
  note('old', 0.5, { status: 'stamped' }),
];

const chart = async (more: Partial<SlewChart> = {}): Promise<SlewChart> =>
  show(new SlewChart(), {
    data: chartOf(popped(), { frameRate: 30, notes: NOTES }),
    fold: 1,
    ...more,
  });
const slider = (): ReturnType<typeof page.getByRole> =>
  page.getByRole('slider', { name: 'Cursor on the trace of hand' });

beforeEach(() => page.viewport(1280, 900));

describe('the chart', () => {
  test('has a slider that reads time, speed and odometer, pictures with names, and buttons that say what they do', async () => {
    await chart({ time: 0.55 });
    await expect
      .element(slider())
      .toHaveAttribute(
        'aria-valuetext',
        '0.550 s, 100 deg/s, about own x 0 deg/s, about own y 100 deg/s, about own z 0 deg/s, odometer 55°',
      );
    await expect
      .element(page.getByRole('img', { name: /^1\.0 s to 2\.0 s: up to 150 deg\/s/ }))
      .toBeInTheDocument();
    await expect.element(page.getByRole('button', { name: 'Lift out key 12' })).toBeInTheDocument();
    await expect.element(page.getByRole('heading', { name: /^hand in Wave/ })).toBeInTheDocument();
  });

  test('is clean for axe, light and dark', async () => {
    expect(await axeFindings(await chart({ chosen: 'pop' }))).toEqual([]);
  });

  test('is clean for axe with the close-up open, light and dark', async () => {
    expect(await axeFindings(await chart({ opened: [1, 1.6], time: 1.2 }))).toEqual([]);
  });

  test('is clean for axe without a track and on narrow paper', async () => {
    expect(await axeFindings(await show(new SlewChart(), {}))).toEqual([]);
    await page.viewport(360, 800);
    const narrow = await chart();
    expect(await axeFindings(narrow)).toEqual([]);
    expect(document.documentElement.scrollWidth).toBeLessThanOrEqual(360);
  });

  test('is walked by the keys of text', async () => {
    const element = await chart({ time: 0 });
    element.focus();
    await userEvent.keyboard('{ArrowRight}');
    expect(element.time).toBeCloseTo(1 / 30, 9);
    await userEvent.keyboard('{Control>}{ArrowRight}{/Control}');
    expect(element.time).toBeCloseTo(0.1, 9);
    await userEvent.keyboard('{ArrowDown}');
    expect(element.time).toBeCloseTo(1.1, 9);
    await userEvent.keyboard('{Home}');
    expect(element.time).toBeCloseTo(1, 9);
  });

  test('reaches every finding by Page Down, in the order of reading, and stops at the last', async () => {
    const element = await chart({ time: 0 });
    const chosen = heard(element, 'note-chosen');
    element.focus();
    await userEvent.keyboard('{PageDown}{PageDown}{PageDown}{PageDown}');
    expect(chosen).toEqual([{ id: 'old' }, { id: 'pop' }, { id: 'bad' }]);
    expect(element.time).toBeCloseTo(2.5, 9);
    await userEvent.keyboard('{PageUp}');
    expect(element.chosen).toBe('pop');
  });

  test('widens the span with Shift and lets go with Escape', async () => {
    const element = await chart({ time: 0 });
    element.focus();
    await userEvent.keyboard('{Shift>}{ArrowRight}{ArrowRight}{/Shift}');
    expect(element.span?.[1]).toBeCloseTo(2 / 30, 9);
    await userEvent.keyboard('{Escape}');
    expect(element.span).toBeUndefined();
  });

  test('opens the close-up with Enter and closes it with Escape, the keyboard staying on the trace', async () => {
    const element = await chart({ time: 1.2 });
    element.focus();
    await userEvent.keyboard('{Enter}');
    await expect.element(page.getByRole('region', { name: /^Close-up, / })).toBeInTheDocument();
    await expect.element(page.getByRole('heading', { name: 'Key 12, 1.200 s' })).toBeInTheDocument();
    await userEvent.keyboard('{Escape}');
    await settled(element);
    expect(page.getByRole('region', { name: /^Close-up, / }).elements()).toEqual([]);
    expect(element.shadowRoot?.activeElement?.getAttribute('role')).toBe('slider');
  });

  test('asks to play with Space', async () => {
    const element = await chart();
    const asked = heard(element, 'play-asked');
    element.focus();
    await userEvent.keyboard(' ');
    expect(asked).toHaveLength(1);
  });

  test('says which remedy was chosen, by its button', async () => {
    const element = await chart();
    const chosen = heard(element, 'remedy-chosen');
    await page.getByRole('button', { name: 'Lift out key 12' }).click();
    expect(chosen).toEqual([{ id: 'pop', way: 0 }]);
    expect(page.getByRole('button', { name: 'Lift out key 5' }).elements()).toEqual([]);
  });

  test('reads exact numbers under the pointer and goes back when it leaves', async () => {
    const element = await chart({ time: 0.55 });
    const sheet = element.renderRoot.querySelectorAll<HTMLElement>('.sheet')[1];
    const box = sheet.getBoundingClientRect();
    sheet.dispatchEvent(
      new PointerEvent('pointermove', {
        clientX: box.left + box.width * 0.15,
        clientY: box.top + 40,
        bubbles: true,
      }),
    );
    await expect
      .element(slider())
      .toHaveAttribute('aria-valuetext', expect.stringContaining('1.150 s, 150 deg/s'));
    element.renderRoot.querySelector('.rows')?.dispatchEvent(new PointerEvent('pointerleave'));
    await expect.element(slider()).toHaveAttribute('aria-valuetext', expect.stringContaining('0.550 s'));
  });

  test('chooses a span by dragging along a row', async () => {
    const element = await chart();
    const spans = heard(element, 'span-chosen');
    const sheet = element.renderRoot.querySelectorAll<HTMLElement>('.sheet')[0];
    const box = sheet.getBoundingClientRect();
    const at = (type: string, share: number): boolean =>
      sheet.dispatchEvent(
        new PointerEvent(type, {
          clientX: box.left + box.width * share,
          clientY: box.top + 40,
          pointerId: 1,
          bubbles: true,
        }),
      );
    sheet.setPointerCapture = () => undefined;
    at('pointerdown', 0.2);
    at('pointermove', 0.4);
    at('pointerup', 0.6);
    expect(spans).toHaveLength(1);
    expect(element.span?.[0]).toBeCloseTo(0.2, 2);
    expect(element.span?.[1]).toBeCloseTo(0.6, 2);
  });

  test('carries the odometer at every row end, as it would a ledger sum', async () => {
    const element = await chart();
    const sums = [...element.renderRoot.querySelectorAll('.carried')].map((sum) =>
      sum.textContent?.replaceAll(/[^\d.°]/g, ''),
    );
    expect(sums).toEqual(['100°', '200°', '300°']);
  });

  test('draws before dotted and the second playback dashed, with a legend and how far they stand apart', async () => {
    const repaired = turning(Array.from({ length: 31 }, (_, i) => i * 10));
    const element = await chart({
      data: chartOf(repaired, {
        before: { motion: curveMotion(playAs(popped(), 'as-written')), name: 'before' },
        second: { motion: curveMotion(playAs(repaired, 'finite-cubic')), name: 'finite cubic' },
      }),
    });
    for (const kind of ['trace', 'before', 'second'])
      expect(element.renderRoot.querySelectorAll(`ol .line.${kind}`).length, kind).toBe(3);
    expect(element.renderRoot.querySelector('.legend')?.textContent).toContain('finite cubic');
    expect(element.renderRoot.textContent).toMatch(/differs from before by up to [45](\.\d+)?°/);
  });

  test('shows two thousand findings in one row without building two thousand notes', async () => {
    const many = Array.from({ length: 2000 }, (_, i) => note(`n${i}`, 0.2 + i * 1e-4));
    const element = await chart({ data: chartOf(popped(), { notes: many }) });
    expect(element.renderRoot.querySelectorAll('.notes li')).toHaveLength(4);
    await expect
      .element(page.getByRole('button', { name: 'Show 1,996 more in this row' }))
      .toBeInTheDocument();
    expect(await axeFindings(element)).toEqual([]);
  });

  test('says so where there is nothing to show', async () => {
    await show(new SlewChart(), {});
    await expect.element(page.getByText('No track is open.')).toBeInTheDocument();
    await show(new SlewChart(), { data: chartOf(turning([])) });
    await expect.element(page.getByText('This track has no keys to play.')).toBeInTheDocument();
    await show(new SlewChart(), { data: chartOf(turning([20])) });
    await expect
      .element(page.getByRole('slider'))
      .toHaveAttribute('aria-valuetext', expect.stringContaining('0 deg/s'));
  });
});
