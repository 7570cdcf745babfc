import { RateLimiterMemory, type RateLimiterRes } from 'rate-limiter-flexible';
import type { Db } from '../../../../db/connection.ts';
import { type Span, SPANS, spanOf } from './spans.ts';
import { addUsage } from './usage.ts';
import type { Plan, VerifiedKey } from './verify.ts';

/** What is left of one of a key's limits. */
export interface Allowance {
  span: Span;
  limit: number;
  /** Length of the span, in seconds. */
  window: number;
  remaining: number;
  /** Seconds until it starts again. */
  reset: number;
}

/** The answer to one call: what is left, the minute first, and which limits it would have exceeded. */
export interface Charge {
  allowances: Allowance[];
  exceeded: Allowance[];
  /** Gives the call back: it was answered from the caller's own copy. */
  refund(): Promise<void>;
}

/** Limits of keys, counted in this process and shared with the others. */
export interface Limits {
  /** Counts one call of a key; a call beyond a limit is not counted. */
  charge(key: VerifiedKey, now: Date): Promise<Charge>;
  /** Writes at once what this process has counted. */
  settle(): Promise<void>;
}

const SETTLE_MS = 1_000;
/** A key not settled for longer than this is settled before its next call is answered. */
const STALE_MS = 1_000;
const KEPT_SECONDS = 24 * 3_600;

/** Calls of a key in one span that the database does not have yet. */
interface Counter {
  name: string;
  span: Span;
  startsAt: Date;
  endsAt: Date;
  pending: number;
}

interface Account {
  keyId: string;
  counters: Map<string, Counter>;
  settledAt: number;
  lastUsed: Date;
  /** The settlement that is running. */
  settling: Promise<void> | null;
}

/**
 * Limits that hold across processes: counted in memory, settled in the database every second while there are calls,
 * so that a key may overrun by no more than one second's calls in each process.
 * @param onTrouble Told when a settlement fails; what was counted is kept for the next.
 */
export function createLimits(db: Db, onTrouble: (error: unknown) => void): Limits {
  // The memory only counts; heights are compared here, so that a changed plan holds from the next call on.
  const memory = new RateLimiterMemory({ points: Number.MAX_SAFE_INTEGER, duration: KEPT_SECONDS });
  const accounts = new Map<string, Account>();
  let timer: NodeJS.Timeout | undefined;

  function accountOf(keyId: string, now: Date): Account {
    let account = accounts.get(keyId);
    if (!account) {
      account = { keyId, counters: new Map(), settledAt: -Infinity, lastUsed: now, settling: null };
      accounts.set(keyId, account);
    }
    return account;
  }

  /** The counters of now; true where one of them is new and knows nothing of other processes yet. */
  function countersOf(account: Account, now: Date): { counters: Counter[]; isNew: boolean } {
    let isNew = false;
    const counters = SPANS.map((span) => {
      const { startsAt, endsAt } = spanOf(span, now);
      const name = `${account.keyId} ${span} ${startsAt.toISOString()}`;
      let counter = account.counters.get(name);
      if (!counter) {
        counter = { name, span, startsAt, endsAt, pending: 0 };
        account.counters.set(name, counter);
        isNew = true;
      }
      return counter;
    });
    return { counters, isNew };
  }

  async function charge(key: VerifiedKey, now: Date): Promise<Charge> {
    const account = accountOf(key.id, now);
    const { counters, isNew } = countersOf(account, now);
    account.lastUsed = now;
    if (isNew) await settleAccount(account);
    else if (performance.now() - account.settledAt > STALE_MS) {
      // Calls that come together wait for one settlement.
      await (account.settling ?? settleAccount(account));
    }
    const used = await count(counters, 1);
    const left = used.map((calls, i) => limitOf(key.plan, counters[i]!.span) - calls);
    const isExceeded = left.some((calls) => calls < 0);
    if (isExceeded) await count(counters, -1);
    const allowances = counters.map((counter, i) => ({
      span: counter.span,
      limit: limitOf(key.plan, counter.span),
      window: (counter.endsAt.getTime() - counter.startsAt.getTime()) / 1_000,
      remaining: Math.max(0, left[i]! + (isExceeded ? 1 : 0)),
      reset: Math.ceil((counter.endsAt.getTime() - now.getTime()) / 1_000),
    }));
    let isCounted = !isExceeded;
    return {
      allowances,
      exceeded: allowances.filter((_, i) => left[i]! < 0),
      async refund() {
        if (!isCounted) return;
        isCounted = false;
        await count(counters, -1);
        for (const allowance of allowances) allowance.remaining += 1;
      },
    };
  }

  async function count(counters: Counter[], calls: 1 | -1): Promise<number[]> {
    for (const counter of counters) counter.pending += calls;
    settleSoon();
    const counted = await Promise.all(
      counters.map(({ name }): Promise<RateLimiterRes> => memory.penalty(name, calls)),
    );
    return counted.map((result) => result.consumedPoints);
  }

  function settleSoon(): void {
    if (timer) return;
    timer = setTimeout(() => {
      timer = undefined;
      settle().catch(onTrouble);
    }, SETTLE_MS);
    timer.unref();
  }

  async function settle(): Promise<void> {
    const due = [...accounts.values()].filter((account) =>
      [...account.counters.values()].some((counter) => counter.pending > 0),
    );
    try {
      await Promise.all(due.map(settleAccount));
    } catch (error) {
      settleSoon();
      throw error;
    }
  }

  /** One settlement of an account at a time, each after the one before. */
  function settleAccount(account: Account): Promise<void> {
    const before = account.settling ?? Promise.resolve();
    const settling = before
      .catch(() => {})
      .then(() => write(account))
      .finally(() => {
        if (account.settling === settling) account.settling = null;
      });
    account.settling = settling;
    return settling;
  }

  async function write(account: Account): Promise<void> {
    const counters = [...account.counters.values()];
    // A call given back after it was settled waits for the next one to be set against.
    const taken = counters.map((counter) => Math.max(0, counter.pending));
    const totals = await addUsage(
      db,
      account.keyId,
      counters.map(({ span, startsAt }, i) => ({ span, startsAt, calls: taken[i]! })),
      account.lastUsed,
    );
    account.settledAt = performance.now();
    await Promise.all(
      counters.map((counter, i) => {
        counter.pending -= taken[i]!;
        return memory.set(counter.name, totals[i]! + counter.pending, KEPT_SECONDS);
      }),
    );
    for (const { name, pending, endsAt } of counters) {
      if (pending <= 0 && endsAt <= account.lastUsed) account.counters.delete(name);
    }
  }

  return { charge, settle };
}

function limitOf(plan: Plan, span: Span): number {
  return span === 'minute' ? plan.perMinute : plan.perMonth;
}
