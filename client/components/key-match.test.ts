import { describe, expect, it } from 'vitest';
import { bindingFor, keyMatches, keyName, pressesItself, takesText, type KeyPress } from './key-match';

const press = (key: string, modifiers: Partial<KeyPress> = {}): KeyPress => ({
  key,
  ctrlKey: false,
  metaKey: false,
  altKey: false,
  shiftKey: false,
  ...modifiers,
});

describe('keyMatches', () => {
  it('takes letters without regard to caps lock, but minds Shift', () => {
    expect(keyMatches('s', press('s'))).toBe(true);
    expect(keyMatches('s', press('S'))).toBe(true);
    expect(keyMatches('s', press('S', { shiftKey: true }))).toBe(false);
    expect(keyMatches('Shift+S', press('S', { shiftKey: true }))).toBe(true);
    expect(keyMatches('Shift+S', press('s'))).toBe(false);
  });

  it('takes signs by what they are, however they are typed', () => {
    expect(keyMatches('?', press('?', { shiftKey: true }))).toBe(true);
    expect(keyMatches('/', press('/', { shiftKey: true }))).toBe(true);
    expect(keyMatches('+', press('+'))).toBe(true);
    expect(keyMatches('1', press('1'))).toBe(true);
  });

  it('leaves the keys of browser and system alone', () => {
    expect(keyMatches('s', press('s', { ctrlKey: true }))).toBe(false);
    expect(keyMatches('s', press('s', { metaKey: true }))).toBe(false);
    expect(keyMatches('s', press('s', { altKey: true }))).toBe(false);
    expect(keyMatches('Ctrl+z', press('z', { metaKey: true }))).toBe(true);
    expect(keyMatches('ArrowDown', press('ArrowDown', { shiftKey: true }))).toBe(false);
  });
});

describe('bindingFor', () => {
  it('lets the one registered last win', () => {
    const action = () => undefined;
    const bindings = [
      { key: 's', label: 'Sort', action },
      { key: 's', label: 'Same', action },
    ];
    expect(bindingFor(bindings, press('s'))?.label).toBe('Same');
    expect(bindingFor(bindings, press('x'))).toBeNull();
  });
});

describe('where keys keep silent', () => {
  it('is where text is typed', () => {
    expect(takesText('INPUT', null, false)).toBe(true);
    expect(takesText('INPUT', 'search', false)).toBe(true);
    expect(takesText('TEXTAREA', null, false)).toBe(true);
    expect(takesText('SELECT', null, false)).toBe(true);
    expect(takesText('DIV', null, true)).toBe(true);
    expect(takesText('INPUT', 'checkbox', false)).toBe(false);
    expect(takesText('BUTTON', null, false)).toBe(false);
  });

  it('is on what Enter presses by itself', () => {
    expect(pressesItself('A', null)).toBe(true);
    expect(pressesItself('BUTTON', null)).toBe(true);
    expect(pressesItself('DIV', 'region')).toBe(false);
  });
});

describe('keyName', () => {
  it('writes keys for people', () => {
    expect(['s', 'Shift+A', 'ArrowDown', '?', '+', ' '].map(keyName)).toEqual([
      'S',
      'Shift A',
      '↓',
      '?',
      '+',
      'Space',
    ]);
  });
});
