import { addDays, differenceInMinutes, format, isSameDay, parseISO } from 'date-fns';
import { noBreak } from '../../lib/spaces.ts';

/** "16:00 today", "16:00 tomorrow", "Thu 3 Dec, 16:00". */
export function shipByWords(shipBy: string, now: Date): string {
  const moment = parseISO(shipBy);
  const hour = format(moment, 'HH:mm');
  if (isSameDay(moment, now)) return `${hour}${noBreak}today`;
  if (isSameDay(moment, addDays(now, 1))) return `${hour}${noBreak}tomorrow`;
  return `${format(moment, 'EEE d MMM').replaceAll(' ', noBreak)}, ${hour}`;
}

/** "2 h 10 min", "40 min", "3 days": the length of a span, coarse enough to read in passing. */
function spanWords(minutes: number): string {
  if (minutes < 60) return `${minutes}${noBreak}min`;
  if (minutes >= 48 * 60) return `${Math.round(minutes / 1440)}${noBreak}days`;
  if (minutes >= 12 * 60) return `${Math.round(minutes / 60)}${noBreak}h`;
  const rest = minutes % 60;
  return `${Math.floor(minutes / 60)}${noBreak}h${rest === 0 ? '' : `${noBreak}${rest}${noBreak}min`}`;
}

/** "in 2 h 10 min" or "late by 40 min". */
export function timeLeftWords(shipBy: string, now: Date): string {
  const minutes = differenceInMinutes(parseISO(shipBy), now);
  return minutes < 0 ? `late by ${spanWords(-minutes)}` : `in ${spanWords(minutes)}`;
}
