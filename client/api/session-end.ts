/** Whether the server has said that the session is over while a page was open. */
let ended = false;
const listeners = new Set<() => void>();

function set(value: boolean): void {
  if (ended === value) return;
  ended = value;
  for (const listener of listeners) listener();
}

export const sessionEnd = {
  get: () => ended,
  announce: () => set(true),
  clear: () => set(false),
  subscribe: (onChange: () => void) => {
    listeners.add(onChange);
    return () => listeners.delete(onChange);
  },
};
