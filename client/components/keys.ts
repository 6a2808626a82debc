import { useEffect, useLayoutEffect, useRef, useSyncExternalStore } from 'react';
import { bindingFor, pressesItself, takesText, type KeyBinding } from './key-match';
import { storedChoice } from './stored-choice';

/** Keys can be switched off for people whose speech or switch software sends single letters (WCAG 2.1.4). */
export const keysChoice = storedChoice('keys', ['on', 'off'], 'on');

type Holder = { readonly current: readonly KeyBinding[] };

const holders: Holder[] = [];
const listeners = new Set<() => void>();
let listed: readonly KeyBinding[] = [];

function relist(): void {
  listed = holders.flatMap((holder) => holder.current);
  for (const listener of listeners) listener();
}

function onKeyDown(event: KeyboardEvent): void {
  if (event.defaultPrevented || event.isComposing || keysChoice.get() === 'off') return;
  const target =
    event.target instanceof HTMLElement || event.target instanceof SVGElement ? event.target : null;
  if (target !== null) {
    const editable = target instanceof HTMLElement && target.isContentEditable;
    if (takesText(target.tagName, target.getAttribute('type'), editable)) return;
    if (target.closest('dialog[open]') !== null) return;
    const role = target.getAttribute('role');
    if ((event.key === 'Enter' || event.key === ' ') && pressesItself(target.tagName, role)) return;
  }
  if (document.querySelector('dialog[open]') !== null) return;
  const bindings = holders.flatMap((holder) => holder.current);
  const binding = bindingFor(bindings, event);
  if (binding === null) return;
  event.preventDefault();
  binding.action(event);
}

/**
 * Keys of a page, in force while it is drawn and listed by '?'. They keep silent while text is typed, while a
 * dialog is open, and when the person has switched keys off. `enabled: false` takes them back for the while.
 */
export function useKeys(
  bindings: readonly KeyBinding[],
  { enabled = true }: { enabled?: boolean } = {},
): void {
  const holder = useRef<readonly KeyBinding[]>([]);
  // What the list shows; actions may change at every drawing without a new listing.
  const signature = enabled ? bindings.map((binding) => `${binding.key}\t${binding.label}`).join('\n') : '';
  useLayoutEffect(() => {
    holder.current = enabled ? bindings : [];
  });
  useEffect(() => {
    if (holders.length === 0) document.addEventListener('keydown', onKeyDown);
    holders.push(holder);
    relist();
    return () => {
      holders.splice(holders.indexOf(holder), 1);
      if (holders.length === 0) document.removeEventListener('keydown', onKeyDown);
      relist();
    };
  }, [signature]);
}

/** All keys now in force, for the list. */
export function useListedKeys(): readonly KeyBinding[] {
  return useSyncExternalStore(
    (onChange) => {
      listeners.add(onChange);
      return () => listeners.delete(onChange);
    },
    () => listed,
  );
}
