import { useLayoutEffect, useRef, useState } from 'react';
import type { RefObject } from 'react';

/** The width of an element in pixels, followed as it changes; `initial` until it is known. */
export function useElementWidth<Element extends HTMLElement>(
  initial: number,
): [RefObject<Element | null>, number] {
  const ref = useRef<Element>(null);
  const [width, setWidth] = useState(initial);
  useLayoutEffect(() => {
    const element = ref.current;
    if (element === null || typeof ResizeObserver === 'undefined') return undefined;
    setWidth(element.clientWidth || initial);
    const observer = new ResizeObserver(() => setWidth(element.clientWidth || initial));
    observer.observe(element);
    return () => observer.disconnect();
  }, [initial]);
  return [ref, width];
}
