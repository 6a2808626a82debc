import { useCallback, useRef, useState, type KeyboardEvent, type PointerEvent } from 'react';
import type { SkyPosition } from '../../shared/astro/sphere';
import { useLatest } from './use-latest';
import { pannedView, zoomedView, type Point, type SkyView } from './sky-frame';

type Moves = Pick<SkyView, 'zoom' | 'panEastArcsec' | 'panNorthArcsec'>;

const AT_REST: Moves = { zoom: 1, panEastArcsec: 0, panNorthArcsec: 0 };
const PAN_STEP_PX = 40;
/** A press that moves less is a click on what lies under it. */
const DRAG_PX = 4;

/** Zoom and pan of a finding chart; a new field begins at rest. */
export function useSkyView(field: { centre: SkyPosition; radiusArcsec: number; sizePx: number }) {
  const fieldKey = `${field.centre.raDeg} ${field.centre.decDeg} ${field.radiusArcsec}`;
  const [state, setState] = useState({ fieldKey, moves: AT_REST });
  const moves = state.fieldKey === fieldKey ? state.moves : AT_REST;
  const view: SkyView = { ...field, ...moves };
  const drag = useRef<{ from: Point; last: Point; moving: boolean } | null>(null);

  const change = (next: SkyView) => {
    const { zoom, panEastArcsec, panNorthArcsec } = next;
    setState({ fieldKey, moves: { zoom, panEastArcsec, panNorthArcsec } });
  };
  const middle: Point = { x: field.sizePx / 2, y: field.sizePx / 2 };
  const zoomBy = (factor: number, at = middle) => change(zoomedView(view, factor, at));
  const reset = () => setState({ fieldKey, moves: AT_REST });

  const onWheel = (event: WheelEvent, element: HTMLElement) => {
    // Over an unfocused chart the wheel goes on scrolling the page.
    if (!event.ctrlKey && document.activeElement !== element) return;
    event.preventDefault();
    const box = element.getBoundingClientRect();
    zoomBy(Math.exp(-event.deltaY * 0.0015), { x: event.clientX - box.left, y: event.clientY - box.top });
  };
  const bind = {
    ref: useWheel(onWheel),
    onKeyDown: (event: KeyboardEvent) => {
      const next = viewAfterKey(event.key, view, middle);
      if (next === null || event.ctrlKey || event.metaKey || event.altKey) return;
      event.preventDefault();
      if (next === 'rest') reset();
      else change(next);
    },
    onPointerDown: (event: PointerEvent) => {
      const at = { x: event.clientX, y: event.clientY };
      if (event.button === 0) drag.current = { from: at, last: at, moving: false };
    },
    onPointerMove: (event: PointerEvent) => {
      const held = drag.current;
      if (held === null) return;
      const at = { x: event.clientX, y: event.clientY };
      if (!held.moving && Math.hypot(at.x - held.from.x, at.y - held.from.y) >= DRAG_PX) {
        held.moving = true;
        // Captured only now: a captured press would take the click away from the marks.
        event.currentTarget.setPointerCapture(event.pointerId);
      }
      if (held.moving) change(pannedView(view, at.x - held.last.x, at.y - held.last.y));
      held.last = at;
    },
    onPointerUp: () => {
      drag.current = null;
    },
    onPointerCancel: () => {
      drag.current = null;
    },
  };
  return { view, moved: moves !== AT_REST, bind, zoomBy: (factor: number) => zoomBy(factor), reset };
}

/** Hears the wheel in a way that may hold the page still, which React's own listener may not. */
function useWheel(onWheel: (event: WheelEvent, element: HTMLElement) => void) {
  const latest = useLatest(onWheel);
  return useCallback(
    (element: HTMLElement | null) => {
      if (element === null) return undefined;
      const listener = (event: WheelEvent) => latest.current(event, element);
      element.addEventListener('wheel', listener, { passive: false });
      return () => element.removeEventListener('wheel', listener);
    },
    [latest],
  );
}

function viewAfterKey(key: string, view: SkyView, middle: Point): SkyView | 'rest' | null {
  switch (key) {
    case '+':
    case '=':
      return zoomedView(view, 1.5, middle);
    case '-':
      return zoomedView(view, 1 / 1.5, middle);
    case '0':
      return 'rest';
    case 'ArrowLeft':
      return pannedView(view, PAN_STEP_PX, 0);
    case 'ArrowRight':
      return pannedView(view, -PAN_STEP_PX, 0);
    case 'ArrowUp':
      return pannedView(view, 0, PAN_STEP_PX);
    case 'ArrowDown':
      return pannedView(view, 0, -PAN_STEP_PX);
    default:
      return null;
  }
}
