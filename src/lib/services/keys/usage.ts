import { sql } from 'kysely';
import type { Db } from '../../../../db/connection.ts';
import type { Span } from './spans.ts';

/** Calls to add to what the database knows of one minute or month of a key. */
export interface Counted {
  span: Span;
  startsAt: Date;
  calls: number;
}

/**
 * Adds what one process has counted of a key and notes when it was last used. Answers, in the order given, what all
 * processes have counted; adding nothing is a way of asking.
 */
export async function addUsage(
  db: Db,
  keyId: string,
  counted: Counted[],
  lastUsed: Date,
): Promise<number[]> {
  const rows = await db
    .insertInto('key_usage')
    .values(
      counted.map(({ span, startsAt, calls }) => ({
        key_id: keyId,
        span,
        starts_at: startsAt,
        calls,
      })),
    )
    .onConflict((conflict) =>
      conflict.columns(['key_id', 'span', 'starts_at']).doUpdateSet({
        calls: (eb) => sql<number>`${eb.ref('key_usage.calls')} + ${eb.ref('excluded.calls')}`,
      }),
    )
    .returning(['span', 'starts_at', 'calls'])
    .execute();
  await db
    .updateTable('api_key')
    .set({ last_request: lastUsed })
    .where('id', '=', keyId)
    .where((eb) => eb.or([eb('last_request', 'is', null), eb('last_request', '<', lastUsed)]))
    .execute();
  return counted.map(
    ({ span, startsAt }) =>
      rows.find((row) => row.span === span && row.starts_at.getTime() === startsAt.getTime())!
        .calls,
  );
}
