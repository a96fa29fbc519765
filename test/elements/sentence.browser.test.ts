import '@slewcurve/elements/define/sentence';
import { SlewSentence } from '@slewcurve/elements/sentence';
import { describe, expect, test } from 'vitest';
import { page, userEvent } from 'vitest/browser';
import { axeFindings, heard, show } from '../support/axe-clean.js';

const HUM = 'Between 26.00 and 31.00 s on crane-head, take out the 11.0 Hz hum, shoulders 0.30 s.';
const sentence = async (more: Partial<SlewSentence> = {}): Promise<SlewSentence> =>
  show(new SlewSentence(), { text: HUM, price: '0.40° becomes 0.02°.', ...more });

describe('the sentence', () => {
  test('is prose with named slots, a price that is told, and buttons that say what they do', async () => {
    await sentence();
    await expect
      .element(page.getByRole('textbox', { name: 'shoulders, time in seconds' }))
      .toHaveValue('0.30');
    await expect.element(page.getByRole('status')).toHaveTextContent('0.40° becomes 0.02°.');
    await expect.element(page.getByRole('button', { name: 'Apply it' })).toBeEnabled();
    await expect.element(page.getByRole('button', { name: 'Leave it' })).toBeEnabled();
  });

  test('is clean for axe, light and dark, with and without a problem', async () => {
    expect(await axeFindings(await sentence())).toEqual([]);
    expect(
      await axeFindings(await sentence({ problem: 'There is no key 99; the track has 31 keys.' })),
    ).toEqual([]);
  });

  test('is filled by typing in a slot', async () => {
    const element = await sentence();
    const said = heard(element, 'sentence-changed');
    await page.getByRole('textbox', { name: 'frequency' }).fill('12.5');
    await userEvent.keyboard('{Enter}');
    expect(said).toEqual([{ text: HUM.replace('11.0', '12.5') }]);
  });

  test('is nudged by the arrow keys', async () => {
    const element = await sentence();
    element.renderRoot.querySelectorAll('input')[3].focus();
    await userEvent.keyboard('{ArrowUp}');
    expect(element.text).toBe(HUM.replace('0.30', '0.31'));
  });

  test('is applied by Ctrl+Enter with what is still being typed', async () => {
    const element = await sentence();
    const asked = heard(element, 'apply-asked');
    await page.getByRole('textbox', { name: 'frequency' }).fill('9.0');
    await userEvent.keyboard('{Control>}{Enter}{/Control}');
    expect(asked).toEqual([{ text: HUM.replace('11.0', '9.0') }]);
  });

  test('is let go by Escape', async () => {
    const element = await sentence();
    const left = heard(element, 'left-alone');
    element.focus();
    await userEvent.keyboard('{Escape}');
    expect(left).toHaveLength(1);
  });

  test('can not be applied while it has a problem', async () => {
    const element = await sentence({ problem: 'There is no key 99.' });
    const asked = heard(element, 'apply-asked');
    await expect.element(page.getByRole('button', { name: 'Apply it' })).toBeDisabled();
    element.focus();
    await userEvent.keyboard('{Control>}{Enter}{/Control}');
    expect(asked).toEqual([]);
  });

  test('can be written whole', async () => {
    const element = await sentence();
    await page.getByRole('button', { name: 'Write the whole sentence' }).click();
    await page.getByRole('textbox', { name: 'The whole sentence' }).fill('On hand in Wave, lift out key 3.');
    await page.getByRole('button', { name: 'Show the slots' }).click();
    expect(element.text).toBe('On hand in Wave, lift out key 3.');
  });
});
