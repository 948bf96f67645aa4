import { useLayoutEffect, useRef, useState, type RefObject } from 'react';

/** Whether an element's content is wider than the element itself. */
export function useOverflow<Element extends HTMLElement>(): [RefObject<Element | null>, boolean] {
  const ref = useRef<Element>(null);
  const [overflows, setOverflows] = useState(false);
  useLayoutEffect(() => {
    const element = ref.current;
    if (element === null || typeof ResizeObserver === 'undefined') return undefined;
    const observer = new ResizeObserver(() =>
      setOverflows(element.scrollWidth > element.clientWidth + 1),
    );
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, overflows];
}
