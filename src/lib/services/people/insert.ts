import { hashPassword } from 'better-auth/crypto';
import { generateId } from 'better-auth';
import { z } from 'zod';
import { PASSWORD_LENGTH } from '../../auth.ts';
import type { InTransaction, Role } from '../context.ts';

/** A name and an address as a person gives them. */
export const personFields = {
  name: z.string().trim().min(1, 'Enter a name.').max(120, 'Use at most 120 characters.'),
  email: z
    .string()
    .trim()
    .toLowerCase()
    .max(254, 'Use at most 254 characters.')
    .pipe(z.email('Enter an e-mail address such as name@example.org.')),
  password: z
    .string()
    .min(PASSWORD_LENGTH.min, `Use at least ${PASSWORD_LENGTH.min} characters.`)
    .max(PASSWORD_LENGTH.max, `Use at most ${PASSWORD_LENGTH.max} characters.`),
};

/**
 * A password as `insertPerson` takes it from callers who make it before their transaction: scrypt takes long on
 * purpose, and whoever signs up must not hold a connection meanwhile.
 */
export async function hashed(password: string): Promise<{ hash: string }> {
  return { hash: await hashPassword(password) };
}

/**
 * Writes a person and their password's hash as better-auth would, but in our transaction, so that the audit row
 * stands or falls with them. Null where somebody has that address.
 */
export async function insertPerson(
  ctx: InTransaction,
  person: {
    name: string;
    email: string;
    role: Role;
    verified: boolean;
    password: string | { hash: string };
  },
): Promise<string | null> {
  const id = generateId();
  // Before it is known whether the address is new, so that the time taken does not tell.
  const { hash } =
    typeof person.password === 'string' ? await hashed(person.password) : person.password;
  const at = ctx.now();
  const made = await ctx.db
    .insertInto('person')
    .values({
      id,
      name: person.name,
      email: person.email,
      email_verified: person.verified,
      role: person.role,
      created_at: at,
      updated_at: at,
    })
    .onConflict((conflict) => conflict.column('email').doNothing())
    .returning('id')
    .executeTakeFirst();
  if (!made) return null;
  await ctx.db
    .insertInto('account')
    .values({
      id: generateId(),
      account_id: id,
      provider_id: 'credential',
      person_id: id,
      password: hash,
      created_at: at,
      updated_at: at,
    })
    .execute();
  return id;
}
