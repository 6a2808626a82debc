import { describe, expect, it } from 'vitest';
import type { NewVerdict, VerdictResult } from '../../../shared/schemas/verdict';
import {
  givenAfter,
  isOnItsWay,
  needsAttention,
  undoable,
  type Given,
  type GivenEvent,
} from './given-verdicts';

const BODY: NewVerdict = {
  entryA: 1,
  entryB: 2,
  value: 'same',
  grade: null,
  flags: [],
  remark: 'kept',
  run: 3,
};

const result = (id: number, conflict = false): VerdictResult => ({
  verdict: {
    id,
    value: 'same',
    grade: null,
    flags: [],
    remark: '',
    origin: 'person',
    by: 'Ada',
    at: '2026-01-01T00:00:00Z',
  },
  objectA: 5,
  objectB: 5,
  conflict,
});

const after = (...events: GivenEvent[]) => events.reduce<readonly Given[]>(givenAfter, []);
const sent = (id: number, seq = id * 10): GivenEvent => ({ type: 'sent', id, seq, body: BODY });

describe('verdicts given at the desk', () => {
  it('undo takes the last saved one, then the one before', () => {
    const given = after(
      sent(1),
      sent(2),
      { type: 'accepted', id: 1, result: result(100) },
      { type: 'accepted', id: 2, result: result(200) },
    );
    expect(undoable(given)?.seq).toBe(20);
    expect(undoable(givenAfter(given, { type: 'taken back', id: 2 }))?.seq).toBe(10);
  });

  it('undo waits for a verdict that is on its way rather than taking an earlier one', () => {
    const given = after(sent(1), { type: 'accepted', id: 1, result: result(100) }, sent(2));
    expect(undoable(given)).toBeNull();
    expect(undoable(givenAfter(given, { type: 'refused', id: 2, problem: 'no connection' }))?.id).toBe(1);
  });

  it('a second undo waits for the first', () => {
    const given = after(
      sent(1),
      { type: 'accepted', id: 1, result: result(100) },
      { type: 'taking back', id: 1 },
    );
    expect(undoable(given)).toBeNull();
    expect(undoable(givenAfter(given, { type: 'not taken back', id: 1, problem: 'away' }))?.id).toBe(1);
  });

  it('a failed verdict keeps what was typed and can be sent again', () => {
    const failed = after(sent(1), { type: 'refused', id: 1, problem: 'no connection' });
    expect(failed[0]).toMatchObject({ state: 'failed', body: { remark: 'kept' } });
    expect(needsAttention(failed[0] as Given)).toBe(true);
    const again = givenAfter(failed, { type: 'sent again', id: 1 });
    expect(again[0]).toMatchObject({ state: 'saving', problem: null });
  });

  it('a second press on the same candidate is held back while the first is on its way', () => {
    const given = after(sent(1, 7));
    expect(isOnItsWay(given, 7)).toBe(true);
    expect(isOnItsWay(given, 8)).toBe(false);
    expect(isOnItsWay(givenAfter(given, { type: 'accepted', id: 1, result: result(1) }), 7)).toBe(false);
  });

  it('a conflict stays in sight until it is dismissed', () => {
    const given = after(sent(1), { type: 'accepted', id: 1, result: result(1, true) });
    expect(given.filter(needsAttention)).toHaveLength(1);
    expect(givenAfter(given, { type: 'dismissed', id: 1 })).toEqual([]);
  });
});
