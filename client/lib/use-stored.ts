import { useCallback, useState } from 'react';
import type { z } from 'zod';

function read<Schema extends z.ZodType>(
  key: string,
  schema: Schema,
  fallback: z.output<Schema>,
): z.output<Schema> {
  try {
    const parsed = schema.safeParse(JSON.parse(localStorage.getItem(key) ?? 'null'));
    return parsed.success ? parsed.data : fallback;
  } catch {
    return fallback;
  }
}

/** A value kept in this browser; what is stored is read by its schema, never trusted. */
export function useStored<Schema extends z.ZodType>(
  key: string,
  schema: Schema,
  fallback: z.output<Schema>,
): [z.output<Schema>, (value: z.output<Schema>) => void] {
  const [value, setValue] = useState(() => read(key, schema, fallback));
  const store = useCallback(
    (next: z.output<Schema>) => {
      setValue(next);
      try {
        localStorage.setItem(key, JSON.stringify(next));
      } catch {
        // Without storage the value lasts as long as the page.
      }
    },
    [key],
  );
  return [value, store];
}
