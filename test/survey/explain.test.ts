import { describe, expect, test } from 'vitest';
import { VERBS } from '@slewcurve/mend';
import { RULES, explainWord } from '@slewcurve/survey';

const namesOf = (word: string) => explainWord(word).entries.map((entry) => entry.name);

describe('explainWord', () => {
  test('every rule and every edit is found by its own name alone', () => {
    for (const name of [...RULES.map((rule) => rule.id), ...VERBS.map((verb) => verb.name)])
      expect(namesOf(name)).toEqual([name]);
  });

  test('every other name of theirs leads to them', () => {
    const rules = RULES.map((rule) => ({ name: rule.id, words: rule.alsoCalled }));
    const verbs = VERBS.map((verb) => ({ name: verb.name, words: verb.alsoCalled }));
    for (const { name, words } of [...rules, ...verbs])
      for (const word of words) {
        const found = namesOf(word);
        // A word that is another's own name leads there alone.
        expect(found.includes(name) || found.join() === word, `${word} → ${name}`).toBe(true);
      }
  });

  // WORDS, Findability: the rows whose rules and edits are built.
  test.each([
    ['pop', ['jump.lone-key', 'jump.shelf']],
    ['spike', ['jump.lone-key', 'jump.shelf']],
    ['glitch', ['jump.lone-key', 'jump.shelf']],
    ['outlier', ['jump.lone-key', 'jump.shelf']],
    ['flip', ['turn.sign-flip', 'turn.half']],
    ['180', ['turn.half']],
    ['sign', ['turn.sign-flip']],
    ['hemisphere', ['turn.sign-flip']],
    ['shortest path', ['turn.sign-flip', 'turn.half']],
    ['long way', ['turn.sign-flip', 'turn.half']],
    ['spinning', ['turn.sign-flip', 'turn.half']],
    ['alignSigns', ['turn.sign-flip']],
    ['NaN', ['file.not-finite']],
    ['C1', ['pace.elbow']],
    ['jitter', ['shake.grain', 'smooth']],
    ['denoise', ['shake.grain', 'smooth']],
    ['filter', ['smooth']],
    ['vibration', ['shake.hum', 'take out hum']],
    ['drift', ['shake.creep', 'take out drift']],
    ['walk cycle', ['seam.loop-gap', 'seam.loop-kink', 'seam.doubled-end', 'close loop']],
    ['seamless', ['seam.loop-gap', 'close loop']],
  ])('%s lands on %j', (word, names) => {
    expect(namesOf(word)).toEqual(expect.arrayContaining(names));
  });

  test('a family leads to all of its rules', () => {
    expect(namesOf('jump')).toEqual(expect.arrayContaining(['jump.lone-key', 'jump.shelf']));
    expect(namesOf('file')).toHaveLength(RULES.filter((rule) => rule.family === 'file').length);
  });

  test('case, hyphens and white space don’t matter', () => {
    expect(namesOf('  Lift-Out ')).toEqual(['lift out']);
    expect(namesOf('SHORTEST_PATH')).toEqual(namesOf('shortest path'));
  });

  test('a misspelt word is answered with the nearest known one, nonsense with nothing', () => {
    expect(explainWord('hemisfere')).toMatchObject({ entries: [], didYouMean: ['hemisphere'] });
    expect(explainWord('turn.hlaf').didYouMean).toEqual(['turn.half']);
    expect(explainWord('xyzzyplugh')).toMatchObject({ entries: [], didYouMean: [] });
    expect(explainWord('')).toMatchObject({ entries: [] });
  });
});
