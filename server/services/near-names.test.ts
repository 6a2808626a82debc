import { describe, expect, it } from 'vitest';
import { difference, editSteps, inTurns, oneSlipAway, splitKey } from './near-names';

describe('what makes two names differ', () => {
  it.each([
    ['wick12', 'wick12b', 'component', 'component B is known'],
    ['wick12b', 'wick12', 'component', 'known without the component letter'],
    ['wick12', 'coal12', 'acronym', 'the same number under another acronym'],
    ['1234', 'wick1234', 'acronym', 'the same number with an acronym'],
    ['wicj1234', 'wack1234', 'acronym', 'the same number under another acronym'],
    ['wicj1234', 'wick1234', 'slip', 'one character differs'],
    ['wick1234', 'wick1235', 'slip', 'one digit differs'],
    ['wick124', 'wick1234', 'slip', 'one digit missing'],
    ['wick12345', 'wick1234', 'slip', 'one digit too many'],
    ['wikc1234', 'wick1234', 'slip', 'two neighbouring characters are swapped'],
    ['wick1243', 'wick1234', 'slip', 'two neighbouring characters are swapped'],
    ['coal-5', 'coal+5', 'slip', 'one character differs'],
    ['flint12', 'flint97', 'slip', '2 characters differ'],
    ['wick11', 'wick22', 'slip', '2 characters differ'],
    ['coalj1413', 'coalj141336.1', 'longer', 'goes on after what was typed: …36.1'],
  ])('%s and %s: %s, %s', (asked, known, kind, words) => {
    expect(difference(asked, known)).toMatchObject({ kind, words });
  });

  it('counts a swap as one step and the rest as single characters', () => {
    expect(difference('wikc1234', 'wick1234').steps).toBe(1);
    expect(difference('flint12', 'flint97').steps).toBe(2);
  });

  it('counts the steps from kitten to sitting as three (Levenshtein distance, textbook example, from memory)', () => {
    expect(editSteps('kitten', 'sitting')).toBe(3);
    expect(editSteps('', 'abc')).toBe(3);
    expect(editSteps('same', 'same')).toBe(0);
  });
});

describe('texts one slip away', () => {
  it('are all one step away, and hold every kind of slip', () => {
    const texts = oneSlipAway('wick12');
    expect(texts).toEqual(expect.arrayContaining(['wik12', 'wwick12', 'wack12', 'wcik12', 'wick123', '2wick12', 'wick1']));
    expect(texts.filter((text) => difference('wick12', text).steps !== 1)).toEqual([]);
    expect(new Set(texts).size).toBe(texts.length);
  });

  it('are as many as counting says: 41 letters at 3 places, 40 others at 2, 2 left out, 1 swap, less doublets', () => {
    // Insertions into 'ab': 3 x 41, of which 'aab' and 'abb' arise twice; replacements 2 x 40; deletions 2; swap 1.
    expect(oneSlipAway('ab')).toHaveLength(3 * 41 - 2 + 2 * 40 + 2 + 1);
  });

  it('are not made for endless keys', () => {
    expect(oneSlipAway('x'.repeat(49))).toEqual([]);
    expect(oneSlipAway('a')).not.toContain('');
  });
});

it('splits a key before its first digit', () => {
  expect(splitKey('wick12b')).toEqual({ acronym: 'wick', rest: '12b' });
  expect(splitKey('vega')).toEqual({ acronym: 'vega', rest: '' });
  expect(splitKey('61cyg')).toEqual({ acronym: '', rest: '61cyg' });
});

it('takes one of each list in turn', () => {
  expect(inTurns([[1, 4, 6], [], [2, 5], [3]])).toEqual([1, 2, 3, 4, 5, 6]);
  expect(inTurns([])).toEqual([]);
});
