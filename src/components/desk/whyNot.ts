import type { Actor } from '../../lib/services/context.ts';
import { may, type Permission, PERMISSIONS } from '../../lib/services/people/permissions.ts';
import type { DeskReleaseDetail } from '../../lib/services/releases/get.ts';
import { isAllowed, type Step, wordOf } from '../../lib/services/releases/state.ts';

const NEEDS: Record<Step, Permission> = {
  submit: 'releases.submit',
  sendBack: 'releases.sendBack',
  approve: 'releases.approve',
  schedule: 'releases.schedule',
  unschedule: 'releases.unschedule',
};

/** Why the person cannot take the step now, in a sentence; null where they can. The verb itself decides again. */
export function whyNot(step: Step, detail: DeskReleaseDetail, actor: Actor): string | null {
  const permission = NEEDS[step];
  if (!may(actor, permission)) {
    const { roles, inWords } = PERMISSIONS[permission];
    return `Only ${roles.map((role) => `${role}s`).join(' and ')} may ${inWords}.`;
  }
  if (!isAllowed(step, detail.state)) {
    return `The release is ${wordOf(detail.state).toLowerCase()}.`;
  }
  if (step !== 'submit') return detail.notSecondPair;
  return null;
}
