import type { Clock } from '../ports.ts';

/** The machine's own time. */
export const systemClock: Clock = { now: () => new Date() };
