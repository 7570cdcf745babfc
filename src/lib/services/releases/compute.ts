import { methodVersion } from '../../build.ts';
import { RefusedError } from '../../econ/refusal.ts';
import type { Assumptions, ComputeRequest, ComputeResult } from '../../econ/types.ts';
import { BusyError } from '../../publication/workers.ts';
import { record } from '../audit.ts';
import { type ServiceContext, ServiceError } from '../context.ts';
import { requirePermission } from '../people/permissions.ts';
import { transact } from '../transact.ts';
import { lockedRelease, requireDraft } from './locked.ts';
import { requestOf } from './request.ts';

/**
 * Computes a draft from its vintage and specification and keeps request and result with it.
 * @throws ServiceError `invalid` where the method refuses, with each reason.
 */
export async function computeRelease(ctx: ServiceContext, id: string): Promise<ComputeResult> {
  requirePermission(ctx.actor, 'releases.draft');
  const inputs = await readInputs(ctx, id);
  const request = requestOf(inputs.frequency, inputs.period, inputs.series, inputs.assumptions);
  const result = await computed(ctx, request);
  if (result.periods.at(-1) !== inputs.period) {
    throw new ServiceError('invalid', `There is no surprise for ${inputs.period} from these data.`);
  }
  await transact(ctx, async (trx) => {
    const release = await lockedRelease(trx, id);
    requireDraft(release);
    if (
      release.vintage_id !== inputs.vintageId ||
      release.specification_id !== inputs.specificationId
    ) {
      throw new ServiceError(
        'conflict',
        'Data or specification were changed during the computation. Compute again.',
      );
    }
    await trx.db
      .updateTable('release')
      .set({
        request: JSON.stringify(request),
        result: JSON.stringify(result),
        computed_at: trx.now(),
        method_version: methodVersion,
        build: trx.build,
        version: release.version + 1,
      })
      .where('id', '=', id)
      .execute();
    await record(trx, {
      action: 'release.computed',
      subject: `release ${id}`,
      detail: {
        vintage: inputs.vintageId,
        specification: inputs.specificationId,
        methodVersion,
        build: trx.build,
        surprise: result.surprise.at(-1),
      },
    });
  });
  return result;
}

async function computed(ctx: ServiceContext, request: ComputeRequest): Promise<ComputeResult> {
  try {
    return await ctx.workers.compute(request);
  } catch (error) {
    if (error instanceof BusyError) throw new ServiceError('conflict', error.message);
    if (!(error instanceof RefusedError)) throw error;
    throw new ServiceError(
      'invalid',
      'The method refuses this computation.',
      error.faults.map(({ pointer, message }) => ({ field: pointer, message })),
    );
  }
}

async function readInputs(ctx: ServiceContext, id: string) {
  const release = await ctx.db
    .selectFrom('release')
    .innerJoin('economy', 'economy.code', 'release.economy_code')
    .innerJoin('specification', 'specification.id', 'release.specification_id')
    .select([
      'release.period',
      'release.vintage_id',
      'release.specification_id',
      'economy.frequency',
      'specification.assumptions',
    ])
    .where('release.id', '=', id)
    .executeTakeFirst();
  if (!release) throw new ServiceError('not_found', `There is no release ${id}.`);
  const series = await ctx.db
    .selectFrom('vintage_series')
    .innerJoin('series', 'series.id', 'vintage_series.series_id')
    .select(['series.concept', 'series.timing', 'start', 'values'])
    .where('vintage_id', '=', release.vintage_id)
    .execute();
  return {
    frequency: release.frequency,
    period: release.period,
    vintageId: release.vintage_id,
    specificationId: release.specification_id,
    assumptions: release.assumptions as Assumptions,
    series,
  };
}
