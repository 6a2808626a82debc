import { describe, expect, it } from 'vitest';
import { KeyFilter } from './key-filter';

describe('key filter', () => {
  it('knows every key again and takes no new key for an old one', () => {
    const filter = new KeyFilter();
    const keys = Array.from({ length: 300_000 }, (_, i) => `LAN ${String(i).padStart(6, '0')}`);
    expect(keys.filter((key) => filter.addAndTest(key))).toEqual([]);
    expect(filter.size).toBe(keys.length);
    expect(keys.filter((key) => !filter.addAndTest(key))).toEqual([]);
  });

  it('keeps keys apart that differ in order, case, length or one distant character', () => {
    const filter = new KeyFilter();
    const keys = [
      'ab',
      'ba',
      'AB',
      'a',
      'aa',
      'aaa',
      '',
      '\u0000',
      'α',
      'x'.repeat(1000),
      `${'x'.repeat(999)}y`,
    ];
    expect(keys.map((key) => filter.addAndTest(key))).toEqual(keys.map(() => false));
  });
});
