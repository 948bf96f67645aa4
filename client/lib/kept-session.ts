import type { z } from 'zod';

const prefix = 'tockwell-kept-';

/** What this tab kept under a name, read by its schema; absent when nothing fits. */
export function readKept<Schema extends z.ZodType>(
  name: string,
  schema: Schema,
): z.output<Schema> | undefined {
  try {
    const parsed = schema.safeParse(JSON.parse(sessionStorage.getItem(prefix + name) ?? 'null'));
    return parsed.success ? parsed.data : undefined;
  } catch {
    return undefined;
  }
}

/** Keeps a value for as long as this tab is open; without storage nothing is kept. */
export function keep(name: string, value: unknown): void {
  try {
    sessionStorage.setItem(prefix + name, JSON.stringify(value));
  } catch {
    // Storage may be refused; the page works without it.
  }
}

export function forgetKept(name: string): void {
  try {
    sessionStorage.removeItem(prefix + name);
  } catch {
    // Nothing could be kept, so there is nothing to forget.
  }
}

/** Forgets everything this tab kept: the next person at the screen finds nothing of the last one. */
export function forgetAllKept(): void {
  try {
    const names = Object.keys(sessionStorage).filter((key) => key.startsWith(prefix));
    for (const key of names) sessionStorage.removeItem(key);
  } catch {
    // Nothing could be kept, so there is nothing to forget.
  }
}
