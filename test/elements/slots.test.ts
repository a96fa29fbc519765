import { fillSlot, nudge, sentencePieces } from '@slewcurve/elements/plot';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';

const HUM =
  'Between 26.00 and 31.00 s on crane-head, take out the 11.0 Hz hum, shoulders 0.30 s, keep 2 keys.';
const slots = (sentence: string): string[] =>
  sentencePieces(sentence).flatMap((piece) =>
    piece.kind === 'slot' ? [`${piece.text}|${piece.label}`] : [],
  );

describe('the slots of a sentence', () => {
  test('are its numbers, labelled by the word before and the unit after', () => {
    expect(slots(HUM)).toEqual([
      '26.00|Between, number',
      '31.00|and, time in seconds',
      '11.0|the, frequency in hertz',
      '0.30|shoulders, time in seconds',
      '2|keep, number of keys',
    ]);
    expect(slots('On hand in Wave, lift out key 19.')).toEqual(['19|key, number of the key']);
  });

  test('are not the numbers within names', () => {
    expect(slots('On spine_02/leg.2 in 1H_Melee_Attack, lift out keys 3 and 4.')).toEqual([
      '3|keys, number of the key',
      '4|and, number',
    ]);
  });

  test('put together are the sentence, whatever it is', () => {
    fc.assert(
      fc.property(fc.oneof(fc.string(), fc.constant(HUM)), (sentence) => {
        expect(
          sentencePieces(sentence)
            .map((piece) => piece.text)
            .join(''),
        ).toBe(sentence);
      }),
    );
  });

  test('can be filled one at a time; an empty filling changes nothing', () => {
    expect(fillSlot(HUM, 2, ' 12.5 ')).toBe(HUM.replace('11.0', '12.5'));
    expect(fillSlot(HUM, 0, '')).toBe(HUM);
    expect(fillSlot(HUM, 99, '1')).toBe(HUM);
  });

  test('are nudged by their last digit', () => {
    expect([nudge('0.30', 1), nudge('0.30', -10), nudge('19', 1), nudge('−3', 1), nudge('x', 1)]).toEqual([
      '0.31',
      '0.20',
      '20',
      '-2',
      'x',
    ]);
  });
});
