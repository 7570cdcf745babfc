import type { Transaction } from 'kysely';
import type { Db } from '../../../db/connection.ts';
import type { Database } from '../../../db/tables.ts';
import type { ArtefactStore } from '../publication/store.ts';
import type { Workers } from '../publication/workers.ts';

export type Role = 'subscriber' | 'editor' | 'reviewer' | 'administrator';

/** Who acts; `system` is the product itself (first seeding, start of a process). */
export type Actor =
  { id: string; role: Role; name: string } | { id: null; role: 'system'; name: string };

/**
 * What every verb that changes something is given. Time is passed in and never read inside: `now()` is
 * database time (src/lib/clock.ts), or the stepped clock of the seed and of tests.
 */
export interface ServiceContext {
  db: Db;
  now: () => Date;
  /** Set where `now` is not the real clock (the seed's stepped one): every audit row then says so. */
  clockNote?: 'stepped';
  actor: Actor;
  store: ArtefactStore;
  workers: Workers;
  /** Where readers reach the site, without a slash at the end. */
  publicUrl: string;
  /** Which build this is; pages are drawn again when it changes. */
  build: string;
}

/** The same inside a transaction; a verb that locks asks for this. */
export type InTransaction = Omit<ServiceContext, 'db'> & { db: Transaction<Database> };

/** A fault of the input or of the state, told to the person who caused it: what, where, what to do. */
export class ServiceError extends Error {
  constructor(
    /** `forbidden` 403, `not_found` 404, `invalid` 422, `conflict` 409, `too_large` 413. */
    readonly kind: 'forbidden' | 'not_found' | 'invalid' | 'conflict' | 'too_large',
    message: string,
    /** Faults by field or by place in a file; empty where the message says all. */
    readonly faults: { field: string; message: string }[] = [],
  ) {
    super(message);
    this.name = 'ServiceError';
  }
}
