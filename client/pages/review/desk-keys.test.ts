import { describe, expect, it } from 'vitest';
import { bindingFor } from '../../components/key-match';
import { GRADES, VERDICT_VALUES } from '../../../shared/words';
import { DESK_KEYS, deskKeysFor, keyOfAct, type DeskAct } from './desk-keys';

const PLAIN = { ctrlKey: false, metaKey: false, altKey: false, shiftKey: false };

/** What the page does on a press, by the same rule that listens in the page. */
function actOf(key: string, mayDecide: boolean, modifiers = PLAIN): DeskAct | null {
  const keys = deskKeysFor(mayDecide).map(({ key: name, label, act }) => ({
    key: name,
    label,
    act,
    action: () => {},
  }));
  const bound = bindingFor(keys, { key, ...modifiers });
  return keys.find((one) => one === bound)?.act ?? null;
}

describe('keys of the desk', () => {
  it('give verdicts and grades', () => {
    expect(actOf('s', true)).toEqual({ kind: 'verdict', value: 'same' });
    expect(actOf('d', true)).toEqual({ kind: 'verdict', value: 'different' });
    expect(actOf('u', true)).toEqual({ kind: 'verdict', value: 'unsure' });
    expect(['1', '2', '3'].map((key) => actOf(key, true))).toEqual(
      GRADES.map((grade) => ({ kind: 'grade', grade })),
    );
  });

  it('move, undo and write', () => {
    expect(['n', 'b', 'z', 'r'].map((key) => actOf(key, true)?.kind)).toEqual([
      'next',
      'back',
      'undo',
      'remark',
    ]);
  });

  it('leave the browser its own keys', () => {
    expect(actOf('s', true, { ...PLAIN, ctrlKey: true })).toBeNull();
    expect(actOf('d', true, { ...PLAIN, altKey: true })).toBeNull();
    expect(actOf('r', true, { ...PLAIN, metaKey: true })).toBeNull();
  });

  it('let readers walk but not decide', () => {
    const silent = DESK_KEYS.map(({ key }) => key).filter((key) => actOf(key, false) === null);
    expect(silent).toEqual(['s', 'd', 'u', '1', '2', '3', 'z', 'r']);
  });

  it('are each used once, and every verdict and grade has one', () => {
    expect(new Set(DESK_KEYS.map(({ key }) => key)).size).toBe(DESK_KEYS.length);
    for (const value of VERDICT_VALUES) expect(keyOfAct({ kind: 'verdict', value })).toHaveLength(1);
    for (const grade of GRADES) expect(keyOfAct({ kind: 'grade', grade })).toHaveLength(1);
  });
});
