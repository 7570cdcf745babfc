import type { Role } from '../../lib/services/context.ts';
import { PERMISSIONS } from '../../lib/services/people/permissions.ts';
import type { Destination } from '../frame/navigation.ts';

const desk: Destination[] = [
  { id: 'releases', label: 'Releases', href: '/desk/' },
  { id: 'data', label: 'Data vintages', href: '/desk/data/' },
  { id: 'specifications', label: 'Specifications', href: '/desk/specifications/' },
  { id: 'economies', label: 'Economies', href: '/desk/economies/' },
];

const account: Destination[] = [
  { id: 'account', label: 'Account', href: '/account/' },
  { id: 'keys', label: 'API keys', href: '/account/keys/' },
];

/** Where somebody of a role may go when signed in. */
export function destinationsOf(role: Role | 'system'): Destination[] {
  const seesDesk = (PERMISSIONS['drafts.see'].roles as string[]).includes(role);
  return seesDesk ? [...desk, ...account] : account;
}

/** Where somebody of a role begins. */
export function homeOf(role: Role | 'system'): string {
  return destinationsOf(role)[0]?.href ?? '/account/';
}
