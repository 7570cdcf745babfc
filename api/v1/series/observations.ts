import { createRoute, z } from '@hono/zod-openapi';
import { frequencyOf, PERIOD_FORM } from '../../../src/lib/econ/periods.ts';
import { viewAsOf } from '../../../src/lib/services/series/asOf.ts';
import { longCsvOf } from '../../../src/lib/services/series/csv.ts';
import { getSeries } from '../../../src/lib/services/series/get.ts';
import type { SeriesInfo } from '../../../src/lib/services/series/list.ts';
import { observations, type Span } from '../../../src/lib/services/series/observations.ts';
import type { Api, ApiContext } from '../../context.ts';
import { listOf } from '../../pagination.ts';
import { type ApiParts, keyed } from '../../parts.ts';
import { badRequest, notFound, ProblemError, problemType } from '../../problems.ts';
import { KEYED, SECURITY, problems } from '../../responses.ts';
import {
  observationSchema,
  presentObservation,
  presentSeries,
  seriesIdParam,
  seriesSchema,
} from './schema.ts';

const text = (description: string) => z.string().max(40).optional().openapi({ description });

/** GET /series/{id}/observations */
export function registerGetObservations(api: Api, parts: ApiParts): void {
  const route = createRoute({
    method: 'get',
    path: '/series/{id}/observations',
    operationId: 'getObservations',
    tags: ['Series'],
    summary: 'The values of a series, now or as they were public at an instant',
    security: SECURITY,
    middleware: keyed(parts, 'read', 'json', 'csv'),
    request: {
      params: seriesIdParam,
      query: z.strictObject({
        from: text('First period, in the form of the series’ frequency.'),
        to: text('Last period, in the form of the series’ frequency.'),
        as_of: text('A time, or a date meaning the end of that day of UTC; never the future.'),
        format: z.enum(['json', 'csv']).optional(),
      }),
    },
    responses: {
      200: {
        description: 'Observations, oldest first.',
        content: {
          'application/json': {
            schema: listOf(observationSchema).extend({ series: seriesSchema }),
          },
          'text/csv': { schema: z.string() },
        },
      },
      ...problems(400, 404, ...KEYED),
    },
  });
  api.openapi(route, async (c) => {
    const { db, env } = c.get('runtime');
    const { id } = c.req.valid('param');
    const { from, to, as_of: asOf } = c.req.valid('query');
    const view = viewOf(c, asOf);
    const current = await getSeries(db, c.get('view'), id);
    if (!current) throw notFound(`There is no series "${id}".`);
    refuseUnserved(current);
    const span = spanOf(current, from, to);
    // What is known now and was not then had no values then.
    const then = asOf === undefined ? current : await getSeries(db, view, id);
    const rows = then ? await observations(db, view, then, span) : [];
    const series = then ?? { ...current, ...NOTHING_YET };
    c.set('lastModified', series.lastUpdated);
    if (c.get('format') === 'csv') {
      return c.body(longCsvOf(series, rows), 200, { 'content-type': 'text/csv; charset=utf-8' });
    }
    const data = rows.map((row) => presentObservation(id, row));
    return c.json({ data, next: null, series: presentSeries(series, env.publicUrl) }, 200);
  });
}

const NOTHING_YET = { firstPeriod: null, lastPeriod: null, lastUpdated: null, releaseId: null };

function viewOf(c: ApiContext, asOf: string | undefined) {
  if (asOf === undefined) return c.get('view');
  const view = viewAsOf(asOf, c.get('now'));
  if ('fault' in view) throw badRequest([{ parameter: 'as_of', message: view.fault }]);
  return view;
}

function spanOf({ frequency }: SeriesInfo, from?: string, to?: string): Span {
  const faults = Object.entries({ from, to })
    .filter(([, period]) => period !== undefined && frequencyOf(period) !== frequency)
    .map(([parameter, period]) => ({
      parameter,
      message: `${parameter} is ${PERIOD_FORM[frequency]}, not "${period}".`,
    }));
  if (from && to && faults.length === 0 && from > to) {
    faults.push({ parameter: 'from', message: `from (${from}) lies after to (${to}).` });
  }
  if (faults.length > 0) throw badRequest(faults);
  return { from, to };
}

function refuseUnserved({ origin, licence }: SeriesInfo): void {
  if (origin.kind === 'derived' || origin.servesValues) return;
  throw new ProblemError({
    status: 403,
    type: problemType('licence'),
    title: 'These values may not be passed on',
    detail: `The source's licence (${licence}) allows no copies; what is computed from them is served.`,
  });
}
