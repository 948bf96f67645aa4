import { useEffect, useRef } from 'react';
import type { RefObject } from 'react';

/** A key that a scanner or a meter sends, wherever the focus is, belongs into the field. */
function isForTheField(event: KeyboardEvent): boolean {
  if (event.ctrlKey || event.metaKey || event.altKey || event.isComposing) return false;
  if (!/^[a-z0-9.,-]$/i.test(event.key)) return false;
  const { target } = event;
  return !(target instanceof HTMLElement) || target.closest('input, textarea, select') === null;
}

/** A field that has the focus on arrival and takes it back as soon as somebody types or scans. */
export function useAlwaysFocused(): RefObject<HTMLInputElement | null> {
  const field = useRef<HTMLInputElement>(null);
  useEffect(() => {
    // After the frame: a page that was just arrived at gives the focus to its main part first.
    const frame = requestAnimationFrame(() => field.current?.focus({ preventScroll: true }));
    const catchKey = (event: KeyboardEvent) => {
      if (isForTheField(event)) field.current?.focus({ preventScroll: true });
    };
    document.addEventListener('keydown', catchKey);
    return () => {
      cancelAnimationFrame(frame);
      document.removeEventListener('keydown', catchKey);
    };
  }, []);
  return field;
}
