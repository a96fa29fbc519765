import '@slewcurve/elements/define/key-turn';
import { SlewKeyTurn } from '@slewcurve/elements/key-turn';
import { describe, expect, test } from 'vitest';
import { page } from 'vitest/browser';
import { axeFindings, heard, show } from '../support/axe-clean.js';

const QUARTER = '0 -1 0 0\n1 0 0 0\n0 0 1 0\n0 0 0 1';
const MIRRORED = '-1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1';

const keyTurn = async (): Promise<SlewKeyTurn> => {
  const element = await show(new SlewKeyTurn(), { key: 3, orientation: [0, 0, 0, 1] as const });
  const details = element.renderRoot.querySelector('details');
  if (details) details.open = true;
  return element;
};

/** Types into the matrix and leaves the field. */
const typeMatrix = async (order: string, text: string): Promise<void> => {
  const field = page.getByRole('textbox', { name: `4 by 4 matrix, ${order}` });
  await field.fill(text);
  field.element().dispatchEvent(new Event('change', { bubbles: true }));
};

describe('the matrix of a key', () => {
  test('is typed in the order that is named beside it', async () => {
    const turns = heard(await keyTurn(), 'turn-typed');
    await typeMatrix('row by row', QUARTER);
    await page.getByRole('combobox', { name: 'As a matrix' }).selectOptions('column by column');
    await typeMatrix('column by column', QUARTER);
    expect(turns).toEqual([
      { turn: [0, 0, 90], about: 'own' },
      { turn: [0, 0, -90], about: 'own' },
    ]);
  });

  test('is refused in words where it is no turn, stays to be put right, and is clean for axe', async () => {
    const element = await keyTurn();
    const turns = heard(element, 'turn-typed');
    await typeMatrix('row by row', MIRRORED);
    const field = page.getByRole('textbox', { name: '4 by 4 matrix, row by row' });
    await expect.element(page.getByText('The matrix is reflected')).toBeVisible();
    await expect.element(field).toHaveAttribute('aria-invalid', 'true');
    await expect.element(field).toHaveValue(MIRRORED);
    expect(turns).toEqual([]);
    expect(await axeFindings(element)).toEqual([]);
    await typeMatrix('row by row', QUARTER);
    await expect.element(field).not.toHaveAttribute('aria-invalid');
    expect(turns).toEqual([{ turn: [0, 0, 90], about: 'own' }]);
  });
});
