import { describe, expect, test } from 'vitest';
import { measuredClock, steppedClock } from '../../src/lib/clock.ts';

const NOON = Date.UTC(2031, 9, 1, 12);

/** A monotonic clock and a database that run together, with a journey of `trip` ms each way. */
function world(trip = 0) {
  let elapsed = 1_000;
  let ahead = NOON - 1_000;
  let away = false;
  return {
    sources: {
      monotonic: () => elapsed,
      database: async () => {
        if (away) throw new Error('no database');
        elapsed += trip;
        const time = elapsed + ahead;
        elapsed += trip;
        return time;
      },
    },
    pass: (ms: number) => (elapsed += ms),
    shift: (ms: number) => (ahead += ms),
    leave: () => (away = true),
    truth: () => elapsed + ahead,
  };
}

describe('the clock', () => {
  test('is the database time, whatever the machine believes', async () => {
    const { sources, pass, truth } = world();
    const clock = measuredClock(sources);
    await clock.measure();
    expect(clock.now().getTime()).toBe(NOON);
    pass(1_234);
    expect(clock.now().getTime()).toBe(truth());
  });

  test('takes the answer to be of the middle of the round trip', async () => {
    const { sources, truth } = world(40);
    const clock = measuredClock(sources);
    await clock.measure();
    expect(clock.now().getTime()).toBe(truth());
  });

  test('trusts the quickest round trip', async () => {
    const trips = [
      [400, 0],
      [1, 1],
      [0, 300],
    ];
    let elapsed = 0;
    const clock = measuredClock({
      monotonic: () => elapsed,
      database: async () => {
        const [there, back] = trips.shift()!;
        elapsed += there!;
        const time = NOON + elapsed;
        elapsed += back!;
        return time;
      },
    });
    await clock.measure();
    expect(clock.now().getTime()).toBe(NOON + elapsed);
  });

  test('follows a database that was set forward', async () => {
    const { sources, shift, truth } = world(5);
    const clock = measuredClock(sources);
    await clock.measure();
    shift(90_000);
    await clock.measure();
    expect(clock.now().getTime()).toBe(truth());
  });

  test('stands still while a database that was set back catches up', async () => {
    const { sources, shift, pass, truth } = world();
    const clock = measuredClock(sources);
    await clock.measure();
    const before = clock.now().getTime();
    shift(-60_000);
    await clock.measure();
    expect(clock.now().getTime()).toBe(before);
    pass(59_000);
    expect(clock.now().getTime()).toBe(before);
    pass(2_000);
    expect(clock.now().getTime()).toBe(truth());
    expect(clock.now().getTime()).toBe(before + 1_000);
  });

  test('never goes back, however the database is set about', async () => {
    const { sources, shift, pass } = world(3);
    const clock = measuredClock(sources);
    await clock.measure();
    let last = clock.now().getTime();
    for (const step of [-5_000, 200, 7_000, -90_000, 1, -1, 40_000, -40_000]) {
      shift(step);
      await clock.measure();
      for (const wait of [0, 10, 3_000]) {
        pass(wait);
        const now = clock.now().getTime();
        expect(now).toBeGreaterThanOrEqual(last);
        last = now;
      }
    }
  });

  test('goes on without its database', async () => {
    const { sources, leave, pass } = world();
    const clock = measuredClock(sources);
    await clock.measure();
    leave();
    await expect(clock.measure()).rejects.toThrow('no database');
    pass(3_600_000);
    expect(clock.now().getTime()).toBe(NOON + 3_600_000);
  });

  test('does not tremble by what a slow round trip leaves open', async () => {
    let elapsed = 0;
    let trips = [1, 1, 1, 1, 1, 1];
    const clock = measuredClock({
      monotonic: () => elapsed,
      database: async () => {
        const time = NOON + elapsed;
        elapsed += trips.shift()!;
        return time;
      },
    });
    await clock.measure();
    const offset = clock.now().getTime() - elapsed;
    trips = [500, 500, 500];
    await clock.measure();
    expect(clock.now().getTime() - elapsed).toBe(offset);
  });

  test('has no time before it was measured', () => {
    expect(() => measuredClock(world().sources).now()).toThrow('not been measured');
  });
});

describe('the stepped clock', () => {
  test('stands where it is set and is never set back', () => {
    const clock = steppedClock(new Date(NOON));
    expect(clock.now()).toEqual(new Date(NOON));
    clock.set(new Date(NOON + 5));
    expect(clock.now()).toEqual(new Date(NOON + 5));
    expect(() => clock.set(new Date(NOON))).toThrow('never set back');
    expect(() => clock.set(new Date(NaN))).toThrow('never set back');
  });
});
