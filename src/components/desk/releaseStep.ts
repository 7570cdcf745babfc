import type { ServiceContext } from '../../lib/services/context.ts';
import { ServiceError } from '../../lib/services/context.ts';
import { approveRelease } from '../../lib/services/releases/approve.ts';
import { chooseInputs } from '../../lib/services/releases/chooseInputs.ts';
import { computeRelease } from '../../lib/services/releases/compute.ts';
import { getDeskRelease } from '../../lib/services/releases/get.ts';
import { scheduleRelease } from '../../lib/services/releases/schedule.ts';
import { sendBackRelease } from '../../lib/services/releases/sendBack.ts';
import { submitRelease } from '../../lib/services/releases/submit.ts';
import { unscheduleRelease } from '../../lib/services/releases/unschedule.ts';
import { writeRelease } from '../../lib/services/releases/write.ts';
import { type Typed, utcTime } from './form.ts';

/**
 * Takes the step that a form of the release's page asks for. Every step of a draft saves the words first: no button
 * loses what was typed.
 */
export async function takeStep(ctx: ServiceContext, id: string, typed: Typed): Promise<void> {
  const version = Number(typed.text('version'));
  const reason = typed.text('reason');
  const write = () =>
    writeRelease(ctx, {
      id,
      version,
      headline: typed.text('headline'),
      explainer: typed.text('explainer'),
    });
  switch (typed.text('step')) {
    case 'write':
      await write();
      return;
    case 'compute':
      await write();
      await computeUnlessInReview(ctx, id);
      return;
    case 'inputs':
      await chooseInputs(ctx, {
        id,
        version: await write(),
        vintageId: typed.text('vintageId'),
        specificationId: typed.text('specificationId'),
      });
      return;
    case 'submit':
      await write();
      return submitRelease(ctx, id);
    case 'approve':
      return approveRelease(ctx, { id, version });
    case 'sendBack':
      return sendBackRelease(ctx, { id, reason });
    case 'schedule':
      return scheduleRelease(ctx, { id, at: utcTime(typed.text('at')) as Date, reason });
    case 'unschedule':
      return unscheduleRelease(ctx, { id, reason });
    default:
      throw new ServiceError('invalid', 'The form asked for nothing that can be done.');
  }
}

/** What is in review has been computed, so a form to compute it that was sent twice asks for nothing more. */
async function computeUnlessInReview(ctx: ServiceContext, id: string): Promise<void> {
  try {
    await computeRelease(ctx, id);
  } catch (error) {
    // Asked only after a refusal: the form's twin may have moved the release on during the computation.
    const isConflict = error instanceof ServiceError && error.kind === 'conflict';
    if (!isConflict || (await getDeskRelease(ctx, id)).state !== 'in_review') throw error;
  }
}
