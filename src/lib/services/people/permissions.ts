import { type Actor, type Role, ServiceError } from '../context.ts';

/** What a person may be allowed to do; each verb asks for one. */
export type Permission =
  | 'account.own'
  | 'economies.edit'
  | 'vintages.load'
  | 'specifications.draft'
  | 'releases.draft'
  | 'releases.submit'
  | 'corrections.prepare'
  | 'dates.propose'
  | 'drafts.see'
  | 'releases.approve'
  | 'releases.sendBack'
  | 'releases.schedule'
  | 'releases.unschedule'
  | 'specifications.approve'
  | 'corrections.approve'
  | 'dates.approve'
  | 'people.manage'
  | 'plans.manage'
  | 'keys.revokeOthers'
  | 'audit.see'
  | 'alarms.see';

const everyone: Role[] = ['subscriber', 'editor', 'reviewer', 'administrator'];

/** Who may what. One role a person, and no role includes another. */
export const PERMISSIONS: Record<Permission, { roles: Role[]; inWords: string }> = {
  'account.own': { roles: everyone, inWords: 'use an account' },
  'economies.edit': { roles: ['editor'], inWords: 'edit economies and their series' },
  'vintages.load': { roles: ['editor'], inWords: 'load data' },
  'specifications.draft': { roles: ['editor'], inWords: 'draft a specification' },
  'releases.draft': { roles: ['editor'], inWords: 'draft a release' },
  'releases.submit': { roles: ['editor'], inWords: 'submit a release' },
  'corrections.prepare': { roles: ['editor'], inWords: 'prepare a correction or withdrawal' },
  'dates.propose': { roles: ['editor'], inWords: 'propose calendar dates' },
  'drafts.see': { roles: ['editor', 'reviewer'], inWords: 'see what is not public yet' },
  'releases.approve': { roles: ['reviewer'], inWords: 'approve a release' },
  'releases.sendBack': { roles: ['reviewer'], inWords: 'send a release back' },
  'releases.schedule': { roles: ['reviewer'], inWords: 'schedule a release' },
  'releases.unschedule': { roles: ['reviewer'], inWords: 'take a release off the schedule' },
  'specifications.approve': { roles: ['reviewer'], inWords: 'approve a specification' },
  'corrections.approve': { roles: ['reviewer'], inWords: 'approve a correction or withdrawal' },
  'dates.approve': { roles: ['reviewer'], inWords: 'approve a change of date' },
  'people.manage': { roles: ['administrator'], inWords: 'invite people and set their roles' },
  'plans.manage': { roles: ['administrator'], inWords: 'change plans' },
  'keys.revokeOthers': { roles: ['administrator'], inWords: 'revoke the keys of others' },
  'audit.see': { roles: ['administrator'], inWords: 'read the audit trail' },
  'alarms.see': { roles: ['administrator'], inWords: 'see alarms' },
};

/** Someone with an account; what remains of `Actor` without the product itself. */
export type SignedIn = Extract<Actor, { id: string }>;

/** Whether the actor may; `system` may do nothing that a person may. */
export function may(actor: Actor, permission: Permission): boolean {
  return actor.id !== null && PERMISSIONS[permission].roles.includes(actor.role);
}

/** The actor, who may do this. @throws ServiceError `forbidden` naming who may. */
export function requirePermission(actor: Actor, permission: Permission): SignedIn {
  if (actor.id !== null && may(actor, permission)) return actor;
  const { roles, inWords } = PERMISSIONS[permission];
  const who = roles.map((role) => `${role}s`).join(' and ');
  throw new ServiceError('forbidden', `Only ${who} may ${inWords}.`);
}
