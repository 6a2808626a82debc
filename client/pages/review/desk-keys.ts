import type { Grade, VerdictValue } from '../../../shared/words';

/** What a key or a button of the desk does. */
export type DeskAct =
  | { kind: 'verdict'; value: VerdictValue }
  | { kind: 'grade'; grade: Grade }
  | { kind: 'next' }
  | { kind: 'back' }
  | { kind: 'undo' }
  | { kind: 'remark' };

export interface DeskKey {
  key: string;
  label: string;
  act: DeskAct;
}

/** The keys of the desk, in the order of the list that '?' shows. */
export const DESK_KEYS: readonly DeskKey[] = [
  { key: 's', label: 'Same', act: { kind: 'verdict', value: 'same' } },
  { key: 'd', label: 'Different', act: { kind: 'verdict', value: 'different' } },
  { key: 'u', label: 'Unsure', act: { kind: 'verdict', value: 'unsure' } },
  { key: '1', label: 'Grade certain, or none', act: { kind: 'grade', grade: 'certain' } },
  { key: '2', label: 'Grade probable, or none', act: { kind: 'grade', grade: 'probable' } },
  { key: '3', label: 'Grade possible, or none', act: { kind: 'grade', grade: 'possible' } },
  { key: 'n', label: 'Next in the queue, without a verdict', act: { kind: 'next' } },
  { key: 'b', label: 'Back in the queue', act: { kind: 'back' } },
  { key: 'z', label: 'Take back the last verdict given here', act: { kind: 'undo' } },
  { key: 'r', label: 'Write a remark; Escape leaves the field', act: { kind: 'remark' } },
];

/** The keys for a person who may or may not decide: readers can walk through the queue. */
export function deskKeysFor(mayDecide: boolean): readonly DeskKey[] {
  return mayDecide ? DESK_KEYS : DESK_KEYS.filter(({ act }) => act.kind === 'next' || act.kind === 'back');
}

/** The key that gives a verdict or a grade, for the sign on its button. */
export function keyOfAct(wanted: DeskAct): string {
  const found = DESK_KEYS.find(({ act }) => JSON.stringify(act) === JSON.stringify(wanted));
  return found?.key ?? '';
}
