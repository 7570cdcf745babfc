import { defaultKeyHasher } from '@better-auth/api-key';
import { generateId } from 'better-auth';
import { generateRandomString } from 'better-auth/crypto';
import { z } from 'zod';
import { record } from '../audit.ts';
import { type Role, type ServiceContext, ServiceError } from '../context.ts';
import { parseInput } from '../parseInput.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';
import { permissionsOf, SCOPES, type Scope } from './scopes.ts';

/** Every key begins with this (as in auth.ts), so that scanners of leaked secrets find it. */
export const KEY_PREFIX = 'slackwater_';
const RANDOM_LENGTH = 48;
/** So much of a key is kept readable, to tell keys apart. */
const SHOWN_LENGTH = KEY_PREFIX.length + 4;
const MOST_KEYS = 20;

const newKey = z.object({
  name: z.string().trim().min(1, 'Enter a name.').max(80, 'Use at most 80 characters.'),
  scopes: z.array(z.enum(SCOPES)).min(1, 'Choose at least one thing the key may do.'),
});

/** Subscribers' keys have the open plan, the desk's people the desk's. */
const PLAN: Record<Role, string> = {
  subscriber: 'open',
  editor: 'desk',
  reviewer: 'desk',
  administrator: 'desk',
};

/** A key that was just made; `plain` is told this once and kept nowhere. */
export interface MadeKey {
  id: string;
  plain: string;
}

/**
 * Makes a key for the one who asks, as the key plugin of sign-in would write it but in our transaction, so that its
 * audit row stands or falls with it. Neither the key nor its hash leaves this file but to its owner.
 */
export async function createKey(
  ctx: ServiceContext,
  input: { name: string; scopes: Scope[] },
): Promise<MadeKey> {
  const owner = requirePermission(ctx.actor, 'account.own');
  const { name, scopes } = parseInput(newKey, input);
  const plain = KEY_PREFIX + generateRandomString(RANDOM_LENGTH, 'a-z', 'A-Z', '0-9');
  const hash = await defaultKeyHasher(plain);
  return transact(ctx, async (trx) => {
    // Two keys made at once would otherwise both find room for one.
    await trx.db
      .selectFrom('person')
      .select('id')
      .where('id', '=', owner.id)
      .forUpdate()
      .executeTakeFirstOrThrow();
    const { count } = await trx.db
      .selectFrom('api_key')
      .select((eb) => eb.fn.countAll<string>().as('count'))
      .where('person_id', '=', owner.id)
      .where('enabled', '=', true)
      .executeTakeFirstOrThrow();
    if (Number(count) >= MOST_KEYS) {
      throw new ServiceError('conflict', `You have ${MOST_KEYS} keys; revoke one first.`);
    }
    const id = generateId();
    const at = trx.now();
    await trx.db
      .insertInto('api_key')
      .values({
        id,
        config_id: 'default',
        name,
        start: plain.slice(0, SHOWN_LENGTH),
        prefix: KEY_PREFIX,
        key: hash,
        person_id: owner.id,
        enabled: true,
        rate_limit_enabled: false,
        request_count: 0,
        permissions: permissionsOf(scopes),
        plan: PLAN[owner.role],
        created_at: at,
        updated_at: at,
      })
      .execute();
    await record(trx, {
      action: 'key.created',
      subject: `key ${id}`,
      detail: { name, scopes, plan: PLAN[owner.role] },
    });
    return { id, plain };
  });
}
