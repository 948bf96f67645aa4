import { differenceInMinutes, format, isSameDay, parseISO } from 'date-fns';
import { noBreak } from './spaces.ts';

/** "1 Dec 2026": the date as it stands in the ledger. */
export function formatDate(timestamp: string): string {
  return format(parseISO(timestamp), 'd MMM yyyy').replaceAll(' ', noBreak);
}

/** "1 Dec 2026, 14:02" in the reader's own time zone. */
export function formatDateTime(timestamp: string): string {
  return `${formatDate(timestamp)}, ${format(parseISO(timestamp), 'HH:mm')}`;
}

/** "16:00 today" or "3 Dec 2026, 16:00". */
export function formatMoment(timestamp: string, now = new Date()): string {
  const moment = parseISO(timestamp);
  return isSameDay(moment, now)
    ? `${format(moment, 'HH:mm')}${noBreak}today`
    : formatDateTime(timestamp);
}

/** Whole minutes from now until then, never negative. */
export function minutesUntil(timestamp: string, now = new Date()): number {
  return Math.max(0, differenceInMinutes(parseISO(timestamp), now));
}
