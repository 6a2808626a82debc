import { useLayoutEffect, useRef, type RefObject } from 'react';

/** A box that always holds the value of the latest drawing, for listeners that outlive it. */
export function useLatest<T>(value: T): RefObject<T> {
  const box = useRef(value);
  useLayoutEffect(() => {
    box.current = value;
  });
  return box;
}
