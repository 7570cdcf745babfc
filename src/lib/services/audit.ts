import { type Kysely, sql } from 'kysely';
import type { Db } from '../../../db/connection.ts';
import type { Database } from '../../../db/tables.ts';
import { sha256 } from '../publication/store.ts';
import type { InTransaction } from './context.ts';

/** What an audit row says: a verb in the past, what it was done to, and what changed. Never a secret or a hash of one. */
export interface AuditEntry {
  /** Such as `release.approved`. */
  action: string;
  /** Such as `release XAL-2031-04-r1`. */
  subject: string;
  detail?: Record<string, unknown>;
}

/** What stands in `previous_hash` of the first row. */
const BEGINNING = '0'.repeat(64);

/**
 * Adds a row to the audit trail, in the transaction of the change it tells of. Each row's hash covers the one
 * before, so the trail is written one transaction at a time from here until it commits: call it last.
 */
export async function record(ctx: InTransaction, entry: AuditEntry): Promise<void> {
  await sql`select pg_advisory_xact_lock(hashtext('slackwater audit'))`.execute(ctx.db);
  const last = await ctx.db
    .selectFrom('audit')
    .select('hash')
    .orderBy('id', 'desc')
    .limit(1)
    .executeTakeFirst();
  const detail = plain({ ...entry.detail, clock: ctx.clockNote });
  const row = {
    at: ctx.now(),
    person_id: ctx.actor.id,
    role: ctx.actor.role,
    action: entry.action,
    subject: entry.subject,
    detail,
  };
  const previous = last?.hash ?? BEGINNING;
  await ctx.db
    .insertInto('audit')
    .values({
      ...row,
      detail: JSON.stringify(detail),
      previous_hash: previous,
      hash: hashOf(previous, row),
    })
    .execute();
}

/** Whether every row still follows from the one before; `brokenAt` is the id of the first that does not. */
export async function verifyAudit(
  db: Db | Kysely<Database>,
): Promise<{ rows: number; brokenAt: string | null }> {
  let previous = BEGINNING;
  let rows = 0;
  let after = '0';
  for (;;) {
    const batch = await db
      .selectFrom('audit')
      .selectAll()
      .where('id', '>', after)
      .orderBy('id')
      .limit(1000)
      .execute();
    for (const row of batch) {
      const follows = row.previous_hash === previous && row.hash === hashOf(previous, row);
      if (!follows) return { rows, brokenAt: row.id };
      previous = row.hash;
      after = row.id;
      rows += 1;
    }
    if (batch.length < 1000) return { rows, brokenAt: null };
  }
}

interface Told {
  at: Date;
  person_id: string | null;
  role: string;
  action: string;
  subject: string;
  detail: unknown;
}

function hashOf(previous: string, { at, person_id, role, action, subject, detail }: Told): string {
  const told = { at: at.toISOString(), person_id, role, action, subject, detail };
  return sha256(previous + canonical(told));
}

/** As JSON keeps it: dates as text, nothing undefined. */
function plain(detail: object): Record<string, unknown> {
  return JSON.parse(JSON.stringify(detail)) as Record<string, unknown>;
}

/** JSON with sorted keys: jsonb gives an object back in an order of its own. */
function canonical(value: unknown): string {
  return JSON.stringify(value, (_key, part: unknown) =>
    part !== null && typeof part === 'object' && !Array.isArray(part)
      ? Object.fromEntries(Object.entries(part).sort(([a], [b]) => (a < b ? -1 : 1)))
      : part,
  );
}
