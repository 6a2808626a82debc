import type { NewVerdict, VerdictResult } from '../../../shared/schemas/verdict';

/** A verdict given at this desk since the page was opened, and how far it has got. */
export interface Given {
  /** Counts up within the page. */
  id: number;
  seq: number;
  body: NewVerdict;
  state: 'saving' | 'saved' | 'failed' | 'taking back' | 'not taken back';
  /** What it did, once saved. */
  result: VerdictResult | null;
  problem: unknown;
}

export type GivenEvent =
  | { type: 'sent'; id: number; seq: number; body: NewVerdict }
  | { type: 'sent again'; id: number }
  | { type: 'accepted'; id: number; result: VerdictResult }
  | { type: 'refused'; id: number; problem: unknown }
  | { type: 'taking back'; id: number }
  | { type: 'taken back'; id: number }
  | { type: 'not taken back'; id: number; problem: unknown }
  | { type: 'dismissed'; id: number };

/** The verdicts given so far after one more event, in the order in which they were given. */
export function givenAfter(given: readonly Given[], event: GivenEvent): readonly Given[] {
  const change = (parts: Partial<Given>) =>
    given.map((one) => (one.id === event.id ? { ...one, ...parts } : one));
  switch (event.type) {
    case 'sent':
      return [
        ...given,
        { id: event.id, seq: event.seq, body: event.body, state: 'saving', result: null, problem: null },
      ];
    case 'sent again':
      return change({ state: 'saving', problem: null });
    case 'accepted':
      return change({ state: 'saved', result: event.result });
    case 'refused':
      return change({ state: 'failed', problem: event.problem });
    case 'taking back':
      return change({ state: 'taking back', problem: null });
    case 'not taken back':
      return change({ state: 'not taken back', problem: event.problem });
    case 'taken back':
    case 'dismissed':
      return given.filter(({ id }) => id !== event.id);
  }
}

/** The verdict that an undo takes back: the last that is saved. Null while none is, or the last is still on its way. */
export function undoable(given: readonly Given[]): Given | null {
  const last = given.findLast(({ state }) => state !== 'failed');
  if (last === undefined || last.state === 'saving' || last.state === 'taking back') return null;
  return last.result?.verdict === null || last.result === null ? null : last;
}

/** True while a verdict on this candidate is on its way: a second press must not send another. */
export function isOnItsWay(given: readonly Given[], seq: number): boolean {
  return given.some((one) => one.seq === seq && (one.state === 'saving' || one.state === 'taking back'));
}

/** Those that a person should look at: failed ones, and ones that could not be carried out. */
export function needsAttention({ state, result }: Given): boolean {
  return state === 'failed' || state === 'not taken back' || result?.conflict === true;
}
