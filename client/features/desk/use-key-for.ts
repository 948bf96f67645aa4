import { useRef } from 'react';
import { newIdempotencyKey } from '../../lib/http.ts';

/** One key for one intent as it is written; a changed form is another intent and gets another key. */
export function useKeyFor(): (body: unknown) => string {
  const last = useRef<{ text: string; key: string }>(undefined);
  return (body) => {
    const text = JSON.stringify(body);
    if (last.current?.text !== text) last.current = { text, key: newIdempotencyKey() };
    return last.current.key;
  };
}
