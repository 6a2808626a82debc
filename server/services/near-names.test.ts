import { describe, expect, it } from 'vitest';
import { differenceInWords, editSteps } from './near-names';

describe('what makes two names differ', () => {
  it.each([
    ['wick12', 'wick12b', 'component B is known'],
    ['wick12b', 'wick12', 'known without the component letter'],
    ['wick12', 'coal12', 'the same number under another acronym'],
    ['wick1234', 'wick1235', 'one digit differs'],
    ['wick124', 'wick1234', 'one digit missing'],
    ['wick12345', 'wick1234', 'one digit too many'],
    ['wicj1234', 'wack1234', 'the same number under another acronym'],
    ['coalj1413', 'coalj141336.1', 'goes on after what was typed: …36.1'],
    ['coal-5', 'coal+5', 'one character differs'],
    ['flint12', 'flint97', '2 characters differ'],
  ])('%s and %s: %s', (asked, known, words) => {
    expect(differenceInWords(asked, known)).toBe(words);
  });

  it('counts the steps from kitten to sitting as three (Levenshtein distance, textbook example, from memory)', () => {
    expect(editSteps('kitten', 'sitting')).toBe(3);
    expect(editSteps('', 'abc')).toBe(3);
    expect(editSteps('same', 'same')).toBe(0);
  });
});
