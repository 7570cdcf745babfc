import { z } from 'zod';
import { record } from '../audit.ts';
import { type Role, type ServiceContext, ServiceError } from '../context.ts';
import { parseInput } from '../parseInput.ts';
import { transact } from '../transact.ts';
import { insertPerson, personFields } from './insert.ts';
import { requirePermission } from './permissions.ts';

const newPerson = z.object({
  ...personFields,
  role: z.enum(['subscriber', 'editor', 'reviewer', 'administrator']),
});

export interface NewPerson {
  name: string;
  email: string;
  role: Role;
  password: string;
}

/** A person by invitation, their address taken as verified. An administrator's verb, and the product's at seeding. */
export async function createPerson(ctx: ServiceContext, input: NewPerson): Promise<string> {
  if (ctx.actor.role !== 'system') requirePermission(ctx.actor, 'people.manage');
  const person = parseInput(newPerson, input);
  return transact(ctx, async (trx) => {
    const id = await insertPerson(trx, { ...person, verified: true });
    if (id === null) {
      throw new ServiceError('conflict', 'Somebody has an account with this address.', [
        { field: 'email', message: 'Enter an address that has no account yet.' },
      ]);
    }
    await record(trx, {
      action: 'person.created',
      subject: `person ${id}`,
      detail: { name: person.name, email: person.email, role: person.role },
    });
    return id;
  });
}
