/** A choice of this browser, kept in its storage; works without it when storage is switched off. */
export interface StoredChoice<V extends string> {
  get: () => V;
  set: (value: V) => void;
  subscribe: (onChange: () => void) => () => void;
}

/** A choice under `idem.<name>`; anything else that stands there counts as the fallback. */
export function storedChoice<V extends string>(
  name: string,
  values: readonly V[],
  fallback: V,
): StoredChoice<V> {
  const key = `idem.${name}`;
  const listeners = new Set<() => void>();
  let current = read(key, values) ?? fallback;
  return {
    get: () => current,
    set(value) {
      current = value;
      try {
        localStorage.setItem(key, value);
      } catch {
        // Not kept for the next visit, but in force for this one.
      }
      for (const listener of listeners) listener();
    },
    subscribe(onChange) {
      listeners.add(onChange);
      const onStorage = (event: StorageEvent) => {
        if (event.key !== key) return;
        current = read(key, values) ?? fallback;
        onChange();
      };
      window.addEventListener('storage', onStorage);
      return () => {
        listeners.delete(onChange);
        window.removeEventListener('storage', onStorage);
      };
    },
  };
}

function read<V extends string>(key: string, values: readonly V[]): V | null {
  try {
    const given = localStorage.getItem(key);
    return values.find((value) => value === given) ?? null;
  } catch {
    return null;
  }
}
