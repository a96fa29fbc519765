import '@slewcurve/elements/define/job-card';
import { SlewJobCard, type JobLine } from '@slewcurve/elements/job-card';
import { describe, expect, test } from 'vitest';
import { page } from 'vitest/browser';
import { axeFindings, heard, show } from '../support/axe-clean.js';

const LINES: JobLine[] = [
  { id: 'a', sentence: 'On hand in Wave, lift out key 12.', price: '5.0° becomes 0.0°.', skipped: false },
  { id: 'b', sentence: 'On hip in Wave, put key 20 on the same side.', skipped: true },
  {
    id: 'c',
    sentence: 'On toe in Wave, close the loop.',
    skipped: false,
    problem: 'There is no track toe in Wave.',
  },
];
const card = async (more: Partial<SlewJobCard> = {}): Promise<SlewJobCard> =>
  show(new SlewJobCard(), { lines: LINES, undo: 'lift out key 12', ...more });

describe('the job card', () => {
  test('is a list of sentences with buttons that say what they do, and to which edit', async () => {
    await card();
    await expect.element(page.getByRole('heading', { name: 'Job card, 3 edits' })).toBeInTheDocument();
    expect(page.getByRole('listitem').elements()).toHaveLength(3);
    await expect.element(page.getByRole('button', { name: 'Move up edit 1' })).toBeDisabled();
    await expect.element(page.getByRole('button', { name: 'Move down edit 3' })).toBeDisabled();
    await expect.element(page.getByRole('button', { name: 'Use again edit 2' })).toBeEnabled();
    await expect.element(page.getByRole('button', { name: 'Undo: lift out key 12' })).toBeEnabled();
    await expect.element(page.getByRole('button', { name: 'Nothing to redo' })).toBeDisabled();
  });

  test('is clean for axe, light and dark, full and empty', async () => {
    expect(await axeFindings(await card())).toEqual([]);
    expect(await axeFindings(await card({ lines: [], undo: '' }))).toEqual([]);
  });

  test('asks to move, skip, remove, show, undo', async () => {
    const element = await card({ redo: 'close the loop' });
    const events = ['line-moved', 'line-skipped', 'line-removed', 'line-chosen', 'undo-asked', 'redo-asked'];
    const all = Object.fromEntries(events.map((type) => [type, heard(element, type)]));
    for (const name of [
      'Move down edit 1',
      'Skip edit 1',
      'Remove edit 3',
      'Show it edit 2',
      'Undo: lift out key 12',
      'Redo: close the loop',
    ])
      await page.getByRole('button', { name }).click();
    expect(all).toEqual({
      'line-moved': [{ id: 'a', to: 1 }],
      'line-skipped': [{ id: 'a', skipped: true }],
      'line-removed': [{ id: 'c' }],
      'line-chosen': [{ id: 'b' }],
      'undo-asked': [null],
      'redo-asked': [null],
    });
  });

  test('says what it did to those who don’t see it', async () => {
    await card();
    await page.getByRole('button', { name: 'Move down edit 1' }).click();
    await expect.element(page.getByRole('status')).toHaveTextContent('Edit moved to place 2 of 3.');
  });
});
