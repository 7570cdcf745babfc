import type { Role, ServiceContext } from '../src/lib/services/context.ts';
import { createPerson } from '../src/lib/services/people/create.ts';
import type { SignedIn } from '../src/lib/services/people/permissions.ts';
import { type DemoAccount, newPassword } from './accounts.ts';

/** The people of the demo: names that are roles, addresses that reach nobody. */
const PEOPLE = {
  administrator: { role: 'administrator', name: 'Administrator' },
  editorOne: { role: 'editor', name: 'Desk editor one' },
  editorTwo: { role: 'editor', name: 'Desk editor two' },
  reviewer: { role: 'reviewer', name: 'Desk reviewer' },
  subscriber: { role: 'subscriber', name: 'Subscriber' },
} as const satisfies Record<string, { role: Role; name: string }>;

export type Cast = Record<keyof typeof PEOPLE, SignedIn>;

/** Makes the demo's people, each with a password of their own. */
export async function createPeople(
  ctx: ServiceContext,
): Promise<{ cast: Cast; accounts: DemoAccount[] }> {
  const accounts: DemoAccount[] = [];
  const cast: Partial<Cast> = {};
  for (const part of Object.keys(PEOPLE) as (keyof Cast)[]) {
    const { role, name } = PEOPLE[part];
    const email = `${name.toLowerCase().replaceAll(' ', '-')}@example.org`;
    const password = newPassword();
    const id = await createPerson(ctx, { name, email, role, password });
    cast[part] = { id, role, name };
    accounts.push({ role, email, password, totp_secret: null });
  }
  return { cast: cast as Cast, accounts };
}
