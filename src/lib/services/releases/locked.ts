import { lockRelease } from '../../../../db/queries/releases.ts';
import type { Release } from '../../../../db/tables.ts';
import { type InTransaction, ServiceError } from '../context.ts';
import { type State, type Step, isAllowed, stateAt, wordOf } from './state.ts';

/** The release, locked to the end of the transaction. @throws ServiceError `not_found` */
export async function lockedRelease(ctx: InTransaction, id: string): Promise<Release> {
  const release = await lockRelease(ctx.db, id);
  if (release) return release;
  throw new ServiceError('not_found', `There is no release ${id}.`);
}

/** @throws ServiceError `conflict` where the step may not be taken from the release's state now. */
export function requireStep(ctx: Pick<InTransaction, 'now'>, release: Release, step: Step): void {
  const state = stateAt(release, ctx.now());
  if (isAllowed(step, state)) return;
  throw new ServiceError('conflict', refusalOf(release.id, state));
}

/** @throws ServiceError `conflict` unless the release is a draft. */
export function requireDraft(release: Release): void {
  if (release.state === 'draft') return;
  throw new ServiceError(
    'conflict',
    `${refusalOf(release.id, release.state)} Only a draft is changed.`,
  );
}

/**
 * Holds what the person saw against what stands now.
 * @throws ServiceError `conflict`: somebody has changed the release since.
 */
export function requireVersion(release: Release, version: number): void {
  if (release.version === version) return;
  throw new ServiceError(
    'conflict',
    'Somebody has changed this release since you opened it. Nothing was saved; what you typed is still below. Look at what stands now, then send it again.',
    [{ field: 'version', message: String(release.version) }],
  );
}

function refusalOf(id: string, state: State): string {
  return `Release ${id} is ${wordOf(state).toLowerCase()} now.`;
}
