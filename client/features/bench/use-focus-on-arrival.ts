import { useEffect, useRef } from 'react';
import type { RefObject } from 'react';

/** Gives the focus to a view's heading when it replaces another one on the same page. */
export function useFocusOnArrival(): RefObject<HTMLHeadingElement | null> {
  const heading = useRef<HTMLHeadingElement>(null);
  useEffect(() => {
    const frame = requestAnimationFrame(() => heading.current?.focus({ preventScroll: true }));
    return () => cancelAnimationFrame(frame);
  }, []);
  return heading;
}
