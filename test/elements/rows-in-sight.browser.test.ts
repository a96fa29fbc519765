import '@slewcurve/elements/define/chart';
import { SlewChart } from '@slewcurve/elements/chart';
import { beforeEach, expect, test } from 'vitest';
import { page } from 'vitest/browser';
import { show } from '../support/axe-clean.js';
import { chartOf, turning } from '../support/tracks-for-elements.js';

/** Ten minutes: 60 rows of 10 s. */
const long = chartOf(turning(Array.from({ length: 6001 }, (_, i) => (i * 10) % 170)));
const rowsOf = (chart: SlewChart): number => chart.renderRoot.querySelectorAll('.row').length;

beforeEach(() => page.viewport(1000, 700));

test('rows of a long take come onto the page a few a picture, and all of them come', async () => {
  const chart = new SlewChart();
  document.body.replaceChildren(chart);
  chart.data = long;
  await chart.updateComplete;
  const first = rowsOf(chart);
  expect(first).toBeGreaterThan(0);
  expect(first).toBeLessThan(20);
  await expect.poll(() => rowsOf(chart)).toBe(60);
});

test('those near the window are drawn, those far down are not', async () => {
  const chart = await show(new SlewChart(), { data: long });
  await expect.poll(() => rowsOf(chart)).toBe(60);
  const traced = (row: number): boolean =>
    chart.renderRoot.querySelector(`[data-row="${row}"] path.trace`) !== null;
  await expect.poll(() => traced(0)).toBe(true);
  expect(traced(59)).toBe(false);
});

test('all are drawn at once for the printer', async () => {
  const chart = new SlewChart();
  document.body.replaceChildren(chart);
  chart.data = long;
  await expect.poll(() => chart.renderRoot.querySelector('path.trace') !== null).toBe(true);
  dispatchEvent(new Event('beforeprint'));
  expect(chart.renderRoot.querySelectorAll('path.trace')).toHaveLength(60);
});
