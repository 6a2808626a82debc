import { describe, expect, it } from 'vitest';
import { placeInGroup } from '../components/places';
import { firstAddress, safeBack } from './guards';

const person = { id: 1, email: 'a@example.org', name: 'A' };
const member = (group: string) => ({ group, name: group, role: 'reader' as const });

describe('firstAddress', () => {
  it('leads to set-up, sign-in, the only group, or the choice', () => {
    expect(firstAddress({ person: null, memberships: [], needsSetup: true })).toBe('/set-up');
    expect(firstAddress({ person: null, memberships: [], needsSetup: false })).toBe('/sign-in');
    expect(firstAddress({ person, memberships: [member('a')], needsSetup: false })).toBe('/g/a/today');
    expect(firstAddress({ person, memberships: [member('a'), member('b')], needsSetup: false })).toBe(
      '/groups',
    );
    expect(firstAddress({ person, memberships: [], needsSetup: false })).toBe('/groups');
  });
});

describe('safeBack', () => {
  it('comes back to pages of a group only', () => {
    expect(safeBack('/g/lantern/objects?q=a')).toBe('/g/lantern/objects?q=a');
    expect(safeBack('/groups')).toBe('/groups');
    for (const bad of [
      null,
      '',
      '/',
      'https://elsewhere.example',
      '//elsewhere.example',
      '/g//elsewhere',
      '/g/\\x',
      '/api/session',
    ]) {
      expect(safeBack(bad)).toBeNull();
    }
  });
});

describe('placeInGroup', () => {
  it('keeps the place and leaves behind what belongs to one group', () => {
    expect(placeInGroup('/g/a/objects/41', 'b')).toBe('/g/b/objects');
    expect(placeInGroup('/g/a/find', 'b')).toBe('/g/b/today');
    expect(placeInGroup('/groups', 'b')).toBe('/g/b/today');
  });
});
