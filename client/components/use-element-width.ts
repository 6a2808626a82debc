import { useCallback, useState } from 'react';

/** Width of an element in whole px, followed as it changes; `fallbackPx` until it has been measured. */
export function useElementWidth(
  fallbackPx: number,
): [(element: Element | null) => (() => void) | undefined, number] {
  const [widthPx, setWidthPx] = useState(fallbackPx);
  const ref = useCallback((element: Element | null) => {
    if (element === null) return undefined;
    const observer = new ResizeObserver(([entry]) => {
      if (entry !== undefined && entry.contentRect.width > 0) setWidthPx(Math.floor(entry.contentRect.width));
    });
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, widthPx];
}
