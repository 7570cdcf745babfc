import { z } from 'zod';
import { type Auth, type Client, ask } from '../../auth.ts';
import { record } from '../audit.ts';
import type { ServiceContext } from '../context.ts';
import { parseInput } from '../parseInput.ts';
import { transact } from '../transact.ts';
import { insertPerson, personFields } from './insert.ts';

const registration = z.object(personFields);

/**
 * Registers somebody as a subscriber and mails the link that confirms the address. Answers the same whether the
 * address is new or not, so that nobody learns who has an account.
 */
export async function signUp(
  ctx: Omit<ServiceContext, 'actor'>,
  auth: Auth,
  client: Client,
  input: { name: string; email: string; password: string },
): Promise<void> {
  const person = parseInput(registration, input);
  await transact({ ...ctx, actor: product }, async (trx) => {
    const id = await insertPerson(trx, { ...person, role: 'subscriber', verified: false });
    if (id === null) return;
    const actor = { id, role: 'subscriber', name: person.name } as const;
    await record(
      { ...trx, actor },
      { action: 'person.signed_up', subject: `person ${id}`, detail: { email: person.email } },
    );
  });
  await ask(auth, client, '/send-verification-email', { email: person.email });
}

const product = { id: null, role: 'system', name: 'Slackwater' } as const;
