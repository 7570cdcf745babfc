import { formatPeriod, parsePeriod, periodDifference } from '../src/lib/econ/periods.ts';
import type { DemoSlot } from './economy.ts';
import { HISTORY_MONTHS } from './generate.ts';

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;

/** Days without releases besides weekends; invented economies keep no others. */
const HOLIDAYS = ['01-01', '12-25', '12-26'];

/** A month's figures are not out before this many days after its end. */
const DAYS_AFTER_MONTH = 25;

/** The times at which the desk works on a release, in order; before its due time, in hours. */
const HOURS_BEFORE = {
  source: 50,
  loaded: 46,
  computed: 45,
  written: 44,
  submitted: 43,
  approved: 22,
  scheduled: 21,
};

/** What is known of a release date, and when the desk takes its steps. */
export interface ReleaseTimes extends Record<keyof typeof HOURS_BEFORE, Date> {
  due: Date;
}

/** The newest month of the demo: the last one that ended at least 25 days before the day of `now` (UTC). */
export function newestMonth(now: Date): string {
  const lastEnd = new Date(startOfDay(now) - DAYS_AFTER_MONTH * DAY);
  // The day after a month's end belongs to the next month, so one more day decides whether the month is over.
  const dayAfter = new Date(lastEnd.getTime() + DAY);
  const index = dayAfter.getUTCFullYear() * 12 + dayAfter.getUTCMonth() - 1;
  return formatPeriod({ frequency: 'monthly', index });
}

/** The first month of the demo's histories. */
export function firstMonth(now: Date): string {
  const { frequency, index } = parsePeriod(newestMonth(now));
  return formatPeriod({ frequency, index: index - HISTORY_MONTHS + 1 });
}

/**
 * When a month's figures of an economy come out and when the desk works on them. The newest month is laid out
 * around the day of seeding; other months keep its day of the month, or the workday before where nobody works then.
 */
export function releaseTimes(now: Date, slot: DemoSlot, period: string): ReleaseTimes {
  const due = dueAt(now, slot, periodDifference(newestMonth(now), period));
  const steps = Object.entries(HOURS_BEFORE).map(([step, hours]) => [
    step,
    new Date(due.getTime() - hours * HOUR),
  ]);
  return { due, ...Object.fromEntries(steps) };
}

function dueAt(now: Date, slot: DemoSlot, monthsOn: number): Date {
  if (monthsOn === 0 && slot.minutesAfterSeeding !== undefined) {
    return new Date(Math.ceil(now.getTime() / MINUTE + slot.minutesAfterSeeding) * MINUTE);
  }
  const day = addMonths(new Date(startOfDay(now) + slot.day * DAY), monthsOn);
  const exact = monthsOn === 0 && slot.day > 0;
  const workday = exact ? day : workdayOrEarlier(day);
  return new Date(workday.getTime() + slot.hour * HOUR + slot.minute * MINUTE);
}

function startOfDay(time: Date): number {
  return Math.floor(time.getTime() / DAY) * DAY;
}

/** The same day so many months on, or that month's last day where it has no such day. */
function addMonths(day: Date, months: number): Date {
  const [year, month] = [day.getUTCFullYear(), day.getUTCMonth() + months];
  const lastDay = new Date(Date.UTC(year, month + 1, 0)).getUTCDate();
  return new Date(Date.UTC(year, month, Math.min(day.getUTCDate(), lastDay)));
}

/** The day itself, or the last one before it on which a statistical office works. */
function workdayOrEarlier(day: Date): Date {
  const isWeekend = day.getUTCDay() === 0 || day.getUTCDay() === 6;
  const isHoliday = HOLIDAYS.includes(day.toISOString().slice(5, 10));
  if (!isWeekend && !isHoliday) return day;
  return workdayOrEarlier(new Date(day.getTime() - DAY));
}
