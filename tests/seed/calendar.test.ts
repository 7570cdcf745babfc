import { describe, expect, test } from 'vitest';
import { firstMonth, newestMonth, releaseTimes } from '../../seed/calendar.ts';
import { demoEconomies } from '../../seed/economies.ts';
import { addPeriods } from '../../src/lib/econ/periods.ts';

const DAY = 86_400_000;
const now = new Date('2031-10-01T13:20:00Z');
const due = (code: string, period: string, at = now) =>
  releaseTimes(at, demoEconomies.find((economy) => economy.code === code)!.slot, period).due;

describe('the calendar of the demo', () => {
  test('ends with the last month that ended at least 25 days before the day of seeding', () => {
    expect(newestMonth(now)).toBe('2031-08');
    expect(firstMonth(now)).toBe('2001-09');
    expect(newestMonth(new Date('2027-03-24T23:59:00Z'))).toBe('2027-01');
    expect(newestMonth(new Date('2027-03-25T00:00:00Z'))).toBe('2027-02');
    expect(newestMonth(new Date('2028-01-31T12:00:00Z'))).toBe('2027-12');
    expect(newestMonth(new Date('2028-01-24T12:00:00Z'))).toBe('2027-11');
  });

  test('has four economies out, one due in fifteen minutes and one ten days on', () => {
    expect(due('XAL', '2031-08').toISOString()).toBe('2031-09-22T08:00:00.000Z');
    expect(due('XBR', '2031-08').toISOString()).toBe('2031-09-25T09:30:00.000Z');
    // The 28th is a Sunday.
    expect(due('XCL', '2031-08').toISOString()).toBe('2031-09-26T10:00:00.000Z');
    expect(due('XFA', '2031-08').toISOString()).toBe('2031-09-30T08:30:00.000Z');
    expect(due('XES', '2031-08').toISOString()).toBe('2031-10-01T13:35:00.000Z');
    expect(due('XDU', '2031-08').toISOString()).toBe('2031-10-11T07:00:00.000Z');
  });

  test('keeps the day of the month, or the workday before where nobody works then', () => {
    const winter = new Date('2026-12-01T16:44:00Z');
    expect(due('XBR', '2026-11', winter).toISOString()).toBe('2026-12-24T09:30:00.000Z');
    expect(due('XES', '2026-11', winter).toISOString()).toBe('2026-12-31T09:00:00.000Z');
    expect(due('XAL', '2031-07').toISOString()).toBe('2031-08-22T08:00:00.000Z');
    expect(due('XAL', '2031-09').toISOString()).toBe('2031-10-22T08:00:00.000Z');
    expect(due('XES', '2031-09').toISOString()).toBe('2031-10-31T09:00:00.000Z');
    expect(due('XAL', '2029-01', new Date('2029-03-31T09:00:00Z')).getUTCDay()).toBeLessThan(6);
  });

  test('holds on any day of four years: what is out is out, in order, and after its month', () => {
    for (let day = 0; day < 4 * 366; day++) {
      const at = new Date(Date.UTC(2026, 0, 1) + day * DAY + ((day * 7919) % DAY));
      const newest = newestMonth(at);
      for (const { code, slot } of demoEconomies) {
        const dates = [-2, -1, 0, 1].map((months) => {
          const period = addPeriods(newest, months);
          const times = releaseTimes(at, slot, period);
          const { source, loaded, computed, written, submitted, approved, scheduled } = times;
          const steps = [
            source,
            loaded,
            computed,
            written,
            submitted,
            approved,
            scheduled,
            times.due,
          ];
          expect(steps).toEqual([...steps].sort((a, b) => a.getTime() - b.getTime()));
          const monthEnd = Date.parse(`${addPeriods(period, 1)}-01T00:00:00Z`);
          expect(source.getTime(), `${code} ${period} at ${at.toISOString()}`).toBeGreaterThan(
            monthEnd,
          );
          return times.due.getTime();
        });
        expect(dates).toEqual([...dates].sort((a, b) => a - b));
        const out = dates.filter((date) => date <= at.getTime()).length;
        expect(out, `${code} at ${at.toISOString()}`).toBe(['XES', 'XDU'].includes(code) ? 2 : 3);
      }
    }
  });
});
