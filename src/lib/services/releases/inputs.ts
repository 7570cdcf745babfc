import type { Economy } from '../../../../db/tables.ts';
import { addPeriods, comparePeriods, frequencyOf, PERIOD_FORM } from '../../econ/periods.ts';
import { type InTransaction, ServiceError } from '../context.ts';
import { addContributor } from './contributors.ts';

/** What a revision is computed from. */
export interface ReleaseInputs {
  vintageId: string;
  specificationId: string;
}

/**
 * Holds a choice of data and specification against the economy and the reference period.
 * @throws ServiceError `invalid` with a fault at the field
 */
export async function checkInputs(
  ctx: InTransaction,
  economy: Economy,
  period: string,
  inputs: ReleaseInputs,
): Promise<{ loadedBy: string; specifiedBy: string }> {
  if (frequencyOf(period) !== economy.frequency) {
    throw fault('period', `Enter ${PERIOD_FORM[economy.frequency]}.`);
  }
  const money = await ctx.db
    .selectFrom('vintage')
    .innerJoin('vintage_series', 'vintage_series.vintage_id', 'vintage.id')
    .innerJoin('series', 'series.id', 'vintage_series.series_id')
    .select(['vintage.loaded_by', 'vintage_series.start', 'vintage_series.values'])
    .where('vintage.id', '=', idOf(inputs.vintageId))
    .where('vintage.economy_code', '=', economy.code)
    .where('series.concept', '=', 'money')
    .executeTakeFirst();
  if (!money) throw fault('vintageId', `Choose a vintage of ${economy.name}.`);
  const last = addPeriods(money.start, money.values.length - 1);
  if (comparePeriods(period, money.start) < 0 || comparePeriods(period, last) > 0) {
    throw fault('period', `This vintage's money runs from ${money.start} to ${last}.`);
  }
  const specification = await ctx.db
    .selectFrom('specification')
    .select(['created_by', 'holds_from', 'version'])
    .where('id', '=', idOf(inputs.specificationId))
    .where('economy_code', '=', economy.code)
    .executeTakeFirst();
  if (!specification) throw fault('specificationId', `Choose a specification of ${economy.name}.`);
  const { holds_from: from, version } = specification;
  if (comparePeriods(period, from) < 0) {
    throw fault('specificationId', `Version ${version} holds from ${from} on, after this period.`);
  }
  return { loadedBy: money.loaded_by, specifiedBy: specification.created_by };
}

/** Notes the makers of the data and the specification, and who chose them. */
export async function noteInputs(
  ctx: InTransaction,
  releaseId: string,
  chosenBy: string,
  made: { loadedBy: string; specifiedBy: string },
): Promise<void> {
  await addContributor(ctx, releaseId, made.loadedBy, 'data');
  await addContributor(ctx, releaseId, made.specifiedBy, 'specification');
  await addContributor(ctx, releaseId, chosenBy, 'specification');
}

/** An id as the database takes it: what is no number is no row. */
function idOf(text: string): string {
  return /^\d{1,18}$/.test(text) ? text : '0';
}

function fault(field: string, message: string): ServiceError {
  return new ServiceError('invalid', 'Some fields need another look.', [{ field, message }]);
}
