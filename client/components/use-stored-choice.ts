import { useSyncExternalStore } from 'react';
import type { StoredChoice } from './stored-choice';

/** Reads and sets a stored choice; follows changes made in other tabs. */
export function useStoredChoice<V extends string>(choice: StoredChoice<V>): [V, (value: V) => void] {
  return [useSyncExternalStore(choice.subscribe, choice.get), choice.set];
}
