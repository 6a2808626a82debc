import fc from 'fast-check';
import { expect, it } from 'vitest';
import { copyTextEscape, copyTextUnescape } from './copy-text';

it('escapes what ends a field or a row (PostgreSQL 15 manual, COPY, Text Format)', () => {
  expect(copyTextEscape('NGC 12')).toBe('NGC 12');
  expect(copyTextEscape('a\tb\nc\rd\\N')).toBe('a\\tb\\nc\\rd\\\\N');
  expect(copyTextUnescape('a\\tb\\nc\\rd\\\\N')).toBe('a\tb\nc\rd\\N');
  expect(copyTextUnescape('\\b\\f\\v')).toBe('\b\f\v');
});

it('gives every text back, and no field holds a bare tab or line end', () => {
  const text = fc.string({ unit: fc.constantFrom('\\', '\t', '\n', '\r', 'n', 't', 'N', 'é', '\u001f') });
  fc.assert(
    fc.property(text, (value) => {
      const field = copyTextEscape(value);
      expect(copyTextUnescape(field)).toBe(value);
      expect(field).not.toMatch(/[\t\n\r]/);
    }),
  );
});
