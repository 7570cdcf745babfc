import { sql } from 'kysely';
import type { Db } from '../../db/connection.ts';

/** The one source of "now": the same second in every process. It never steps back. */
export interface Clock {
  now(): Date;
}

/** What a measured clock is made from: both in milliseconds. */
export interface TimeSources {
  /** The database's time since 1970. */
  database(): Promise<number>;
  /** Time since any fixed point, never set by anybody. */
  monotonic(): number;
}

const INTERVAL = 10_000;
const SAMPLES = 3;

/**
 * A clock on database time, measured now and every 10 s. While the database is away it goes on with
 * the offset it has. Throws when the first measurement fails.
 */
export async function startClock(db: Db): Promise<Clock & { stop(): void }> {
  const clock = measuredClock({
    database: async () => {
      const { rows } = await sql<{ time: number }>`
        select (extract(epoch from clock_timestamp()) * 1000)::float8 as time`.execute(db);
      return rows[0]!.time;
    },
    monotonic: () => performance.now(),
  });
  await clock.measure();
  let measuring = false;
  const timer = setInterval(() => {
    if (measuring) return;
    measuring = true;
    clock
      .measure()
      .catch(() => {})
      .finally(() => (measuring = false));
  }, INTERVAL);
  timer.unref();
  return { now: () => clock.now(), stop: () => clearInterval(timer) };
}

/**
 * The clock itself: monotonic time plus an offset. `measure` sets the offset from the quickest of a few
 * round trips, taking the database's answer to be of their middle. Where the database turns out to be
 * behind, the clock stands still until it has caught up; `now` before the first measurement throws.
 */
export function measuredClock(sources: TimeSources): Clock & { measure(): Promise<void> } {
  let offset: number | null = null;
  let latest = -Infinity;

  async function sample(): Promise<{ low: number; high: number }> {
    const sent = sources.monotonic();
    const time = await sources.database();
    // The database read its clock at some moment between sending and receiving.
    return { low: time - sources.monotonic(), high: time - sent };
  }

  return {
    async measure() {
      let best = await sample();
      for (let count = 1; count < SAMPLES; count += 1) {
        const next = await sample();
        if (next.high - next.low < best.high - best.low) best = next;
      }
      // An offset that this round trip does not contradict is kept: no trembling by its uncertainty.
      if (offset !== null && offset >= best.low && offset <= best.high) return;
      offset = (best.low + best.high) / 2;
    },
    now() {
      if (offset === null) throw new Error('The clock has not been measured yet');
      latest = Math.max(latest, sources.monotonic() + offset);
      return new Date(latest);
    },
  };
}

/** A clock that stands where it is set, for seeding and tests; setting it back throws. */
export function steppedClock(start: Date): Clock & { set(date: Date): void } {
  let time = start.getTime();
  return {
    now: () => new Date(time),
    set(date) {
      if (!(date.getTime() >= time)) throw new Error('A clock is never set back');
      time = date.getTime();
    },
  };
}
