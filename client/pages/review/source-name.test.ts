import { describe, expect, it } from 'vitest';
import { sourceName } from './source-name';

describe('sourceName', () => {
  it('names the catalogue once', () => {
    expect(sourceName({ catalogue: 'HUM', designation: 'HUM 1630' })).toBe('HUM 1630');
    expect(sourceName({ catalogue: 'HUM', designation: 'Hum-1630' })).toBe('Hum-1630');
    expect(sourceName({ catalogue: 'LAN-O', designation: '1630' })).toBe('LAN-O 1630');
  });
});
