import { defaultKeyHasher } from '@better-auth/api-key';
import type { Db } from '../../../../db/connection.ts';
import { KEY_PREFIX } from './create.ts';
import { type Scope, scopesOf } from './scopes.ts';

/** A key that works. */
export interface VerifiedKey {
  id: string;
  personId: string;
  scopes: Scope[];
  plan: Plan;
  expiresAt: Date | null;
}

/** Calls a minute and a month of UTC. */
export interface Plan {
  name: string;
  perMinute: number;
  perMonth: number;
}

/** Keys, plans and closed accounts take effect within a second in every process, so nothing is kept longer. */
const KEPT_MS = 900;
/** Wrong keys are kept too, so that trying them costs the database little; but not without end. */
const MOST_KEPT = 10_000;
const LONGEST = 200;

/** Answers what a plain key may do, or null where it is unknown, revoked, expired or its owner's account is closed. */
export type KeyVerifier = (plain: string, now: Date) => Promise<VerifiedKey | null>;

/** A verifier with a memory of its own: one look-up by hash for each key and second, however many calls. */
export function keyVerifier(db: Db, elapsed: () => number = () => performance.now()): KeyVerifier {
  const kept = new Map<string, { until: number; found: Promise<VerifiedKey | null> }>();
  return async (plain, now) => {
    if (!plain.startsWith(KEY_PREFIX) || plain.length > LONGEST) return null;
    const hash = await defaultKeyHasher(plain);
    let entry = kept.get(hash);
    if (!entry || entry.until <= elapsed()) {
      if (kept.size >= MOST_KEPT) kept.clear();
      entry = { until: elapsed() + KEPT_MS, found: lookUp(db, hash, now) };
      kept.set(hash, entry);
      // A database that is away must not be remembered as an answer.
      entry.found.catch(() => kept.delete(hash));
    }
    const key = await entry.found;
    return key?.expiresAt && key.expiresAt <= now ? null : key;
  };
}

async function lookUp(db: Db, hash: string, now: Date): Promise<VerifiedKey | null> {
  const row = await db
    .selectFrom('api_key')
    .innerJoin('plan', 'plan.name', 'api_key.plan')
    .innerJoin('person', 'person.id', 'api_key.person_id')
    .select([
      'api_key.id',
      'api_key.person_id',
      'api_key.permissions',
      'api_key.expires_at',
      'plan.name',
      'plan.per_minute',
      'plan.per_month',
      'person.banned',
      'person.ban_expires',
    ])
    .where('api_key.key', '=', hash)
    .where('api_key.enabled', '=', true)
    .executeTakeFirst();
  if (!row) return null;
  const isClosed = row.banned && !(row.ban_expires && row.ban_expires < now);
  if (isClosed) return null;
  return {
    id: row.id,
    personId: row.person_id,
    scopes: scopesOf(row.permissions),
    plan: { name: row.name, perMinute: row.per_minute, perMonth: row.per_month },
    expiresAt: row.expires_at,
  };
}
