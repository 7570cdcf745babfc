import { RateLimiterMemory, RateLimiterRes } from 'rate-limiter-flexible';
import { z } from 'zod';
import { type Auth, type Client, ask } from '../../auth.ts';
import { record } from '../audit.ts';
import { type ServiceContext, ServiceError } from '../context.ts';
import { parseInput } from '../parseInput.ts';
import { transact } from '../transact.ts';
import { hashed, insertPerson, personFields } from './insert.ts';

/** Sign-ups from one address, in this many seconds. */
const LIMIT = { points: 10, duration: 3600 };

/**
 * Each `Auth` has its own count, which ends with it, as its own limits of signing in do: those know only the paths of
 * its handler, and signing up is none. A count of the module would be shared by all that one process serves.
 */
const limiters = new WeakMap<Auth, RateLimiterMemory>();

const registration = z.object(personFields);

/**
 * Registers somebody as a subscriber and mails the link that confirms the address. Answers the same whether the
 * address is new or not, so that nobody learns who has an account.
 * @throws ServiceError `forbidden` after too many sign-ups from one address; no account is made.
 */
export async function signUp(
  ctx: Omit<ServiceContext, 'actor'>,
  auth: Auth,
  client: Client,
  input: { name: string; email: string; password: string },
): Promise<void> {
  const person = parseInput(registration, input);
  await count(auth, client);
  const password = await hashed(person.password);
  await transact({ ...ctx, actor: product }, async (trx) => {
    const id = await insertPerson(trx, {
      ...person,
      password,
      role: 'subscriber',
      verified: false,
    });
    if (id === null) return;
    const actor = { id, role: 'subscriber', name: person.name } as const;
    await record(
      { ...trx, actor },
      { action: 'person.signed_up', subject: `person ${id}`, detail: { email: person.email } },
    );
  });
  await ask(auth, client, '/send-verification-email', { email: person.email });
}

async function count(auth: Auth, client: Client): Promise<void> {
  const limiter = limiters.get(auth) ?? new RateLimiterMemory(LIMIT);
  limiters.set(auth, limiter);
  try {
    await limiter.consume(client.address);
  } catch (refusal) {
    if (!(refusal instanceof RateLimiterRes)) throw refusal;
    const minutes = Math.ceil(refusal.msBeforeNext / 60_000);
    throw new ServiceError(
      'forbidden',
      `Too many accounts were asked for from your network. No account was made; try again in ${minutes} ${minutes === 1 ? 'minute' : 'minutes'}.`,
    );
  }
}

const product = { id: null, role: 'system', name: 'Slackwater' } as const;
