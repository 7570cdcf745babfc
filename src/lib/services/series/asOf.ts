import type { View } from '../view.ts';

const DATE = /^\d{4}-\d{2}-\d{2}$/;
const TIME = /^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}(:\d{2}(\.\d{1,9})?)?(Z|[+-]\d{2}:\d{2})$/;
const DAY_MS = 24 * 3600 * 1000;

/**
 * The view that `as_of` asks for: of a time, or of a date up to the end of that UTC day, but never later than now.
 * Answers a sentence where the text is no such thing or lies wholly in the future.
 */
export function viewAsOf(text: string, now: Date): View | { fault: string } {
  if (DATE.test(text)) {
    const start = new Date(`${text}T00:00:00.000Z`);
    if (!isCalendarDay(start, text)) return { fault: `"${text}" is not a day of the calendar.` };
    if (start > now) return { fault: `${text} lies in the future.` };
    return { at: new Date(Math.min(start.getTime() + DAY_MS - 1, now.getTime())) };
  }
  const time = TIME.test(text) ? new Date(text) : new Date(NaN);
  const day = new Date(`${text.slice(0, 10)}T00:00:00.000Z`);
  if (Number.isNaN(time.getTime()) || !isCalendarDay(day, text.slice(0, 10))) {
    return {
      fault: `"${text}" is neither a date such as 2031-09-24 nor a time such as 2031-09-24T07:00:00Z.`,
    };
  }
  if (time > now) return { fault: `${text} lies in the future.` };
  return { at: time };
}

/** JavaScript takes 30 February for 2 March. */
function isCalendarDay(day: Date, text: string): boolean {
  return !Number.isNaN(day.getTime()) && day.toISOString().startsWith(text);
}
