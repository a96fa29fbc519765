import '@slewcurve/elements/define/roster';
import { SlewRoster } from '@slewcurve/elements/roster';
import { trackInk, type RosterRow } from '@slewcurve/elements/plot';
import { beforeEach, describe, expect, test } from 'vitest';
import { page, userEvent } from 'vitest/browser';
import { axeFindings, heard, settled, show } from '../support/axe-clean.js';

const row = (i: number, more: Partial<RosterRow> = {}): RosterRow => ({
  id: `t${i}`,
  file: 'knight.glb',
  clip: 'Walk',
  track: `Hips/joint_${i}`,
  seconds: 10,
  ink: trackInk(
    Float32Array.from({ length: 600 }, (_, k) => 40 + 20 * Math.sin(k / 30 + i)),
    1 / 60,
    0.1,
  ),
  counts: { error: 0, warning: 0, note: 0 },
  places: 0,
  rules: [],
  families: {},
  marks: [],
  peak: 60,
  travel: 400,
  ...more,
});
const rows = (count: number): RosterRow[] =>
  Array.from({ length: count }, (_, i) =>
    row(
      i,
      i === 7
        ? {
            counts: { error: 0, warning: 1, note: 0 },
            places: 1,
            rules: ['jump.lone-key'],
            families: { jump: 1 },
            marks: [{ time: 5, level: 'warning' }],
          }
        : {},
    ),
  );
const roster = async (count: number, more: Partial<SlewRoster> = {}): Promise<SlewRoster> =>
  show(new SlewRoster(), { rows: rows(count), ...more });

beforeEach(() => page.viewport(1280, 900));

describe('the roster', () => {
  test('is a list of tracks, each said in a sentence, the worst first', async () => {
    await roster(12);
    await expect.element(page.getByRole('listbox', { name: 'Tracks' })).toBeInTheDocument();
    const first = page.getByRole('option', { name: 'joint_7 in Walk: 1 warning, peak 60 deg/s, turns 400°' });
    await expect.element(first).toHaveAttribute('aria-posinset', '1');
    await expect.element(first).toHaveAttribute('aria-setsize', '12');
    await expect.element(page.getByRole('status')).toHaveTextContent('12 tracks, 1 with findings.');
  });

  test('is clean for axe, light and dark, wide, close, narrow and empty', async () => {
    expect(await axeFindings(await roster(12))).toEqual([]);
    expect(await axeFindings(await roster(80))).toEqual([]);
    expect(await axeFindings(await roster(0))).toEqual([]);
    await page.viewport(360, 800);
    expect(await axeFindings(await roster(12))).toEqual([]);
    expect(document.documentElement.scrollWidth).toBeLessThanOrEqual(360);
  });

  test('is walked by arrows and opened by Enter, the active row being told', async () => {
    const element = await roster(12);
    const chosen = heard(element, 'track-chosen');
    element.focus();
    await userEvent.keyboard('{ArrowDown}{ArrowDown}{Enter}');
    expect(chosen).toEqual([{ id: 't1', row: element.rows[1] }]);
    await settled(element);
    const list = element.renderRoot.querySelector('[role=listbox]');
    const active = list?.getAttribute('aria-activedescendant') ?? '';
    expect(element.renderRoot.querySelector(`[id="${active}"]`)?.getAttribute('aria-selected')).toBe('true');
  });

  test('finds a track from anywhere by "/", and opens the best match by Enter', async () => {
    const element = await roster(200);
    const chosen = heard(element, 'track-chosen');
    await userEvent.keyboard('/');
    await expect.element(page.getByRole('searchbox', { name: 'Find a track' })).toBeInTheDocument();
    expect(element.shadowRoot?.activeElement?.getAttribute('type')).toBe('search');
    await userEvent.keyboard('joint_133');
    await expect.element(page.getByRole('status')).toHaveTextContent('1 of 200 tracks, none with findings.');
    await userEvent.keyboard('{Enter}');
    expect(chosen).toHaveLength(1);
    expect(chosen[0]).toMatchObject({ id: 't133' });
    await userEvent.keyboard('{Escape}');
    await expect.element(page.getByRole('status')).toHaveTextContent('200 tracks');
  });

  test('says so where nothing is found', async () => {
    const element = await roster(5, { find: 'tail' });
    expect(element.renderRoot.querySelector('.empty')?.textContent).toContain('No track answers to “tail”');
  });

  test('builds a page of two thousand rows only, and End reaches the last', async () => {
    const element = await roster(2000);
    expect(element.renderRoot.querySelectorAll('[role=option]').length).toBeLessThan(120);
    element.focus();
    await userEvent.keyboard('{End}');
    await settled(element);
    const active = element.renderRoot.querySelector('.option.active');
    expect(active?.getAttribute('aria-posinset')).toBe('2000');
    const list = element.renderRoot.querySelector('.scroll')?.getBoundingClientRect();
    const box = active?.getBoundingClientRect();
    expect(box && list && box.bottom <= list.bottom + 1 && box.top >= list.top).toBe(true);
  });

  test('shows a pop of one frame among 21,600 in its pixel column, and nowhere else', async () => {
    const speeds = new Float32Array(21_600).fill(40);
    speeds[9000] = 600;
    const element = await show(new SlewRoster(), {
      rows: [row(0, { ink: trackInk(speeds, 1 / 120, 0.1), seconds: 180 })],
    });
    await settled(element);
    const canvas = element.renderRoot.querySelector('canvas');
    const image = canvas?.getContext('2d')?.getImageData(0, 0, canvas.width, canvas.height);
    if (!canvas || !image) throw new Error('the roster has no canvas');
    const black = Array.from({ length: canvas.width }, (_, x) => x).filter((x) =>
      Array.from({ length: canvas.height }, (_, y) => image.data[(y * canvas.width + x) * 4 + 3]).some(
        (alpha) => alpha === 255,
      ),
    );
    // One column, or two where its bin lies on their border.
    expect(black.length).toBeGreaterThanOrEqual(1);
    expect(black.length).toBeLessThanOrEqual(2);
    expect(black[0]).toBeCloseTo((9000 / 21_600) * canvas.width, -0.5);
  });
});
