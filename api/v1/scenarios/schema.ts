import { z } from '@hono/zod-openapi';

const series = (description: string) => ({
  type: 'object' as const,
  description,
  required: ['start', 'values'],
  properties: {
    start: { type: 'string' as const, description: 'First period.' },
    values: { type: 'array' as const, maxItems: 2000, items: { type: 'number' as const } },
    timing: { type: 'string' as const, enum: ['end', 'average'] },
  },
});

/**
 * The request as its readers see it. It is described and not checked by this: the computation's own reader names
 * every fault of it at once.
 */
export const requestDocument = {
  type: 'object' as const,
  required: ['frequency', 'money', 'expectation', 'slope'],
  additionalProperties: false,
  properties: {
    frequency: { type: 'string' as const, enum: ['monthly', 'quarterly', 'annual'] },
    money: series('Money, levels.'),
    prices: series('Prices, levels.'),
    activity: series('Activity or output, levels.'),
    surveyed_growth: series('Growth of money as expected a period before, log points a period.'),
    expectation: {
      type: 'object' as const,
      required: ['rule'],
      properties: {
        rule: {
          type: 'string' as const,
          enum: ['random_walk', 'autoregression', 'adaptive', 'survey'],
        },
      },
    },
    slope: {
      type: 'object' as const,
      required: ['method'],
      properties: {
        method: { type: 'string' as const, enum: ['fixed', 'structural', 'prices', 'activity'] },
      },
    },
    gap: {
      type: 'object' as const,
      properties: {
        persistence: {
          anyOf: [
            { type: 'string' as const, enum: ['none', 'estimated'] },
            { type: 'number' as const, minimum: 0, exclusiveMaximum: 1 },
          ],
        },
      },
    },
    confidence: { type: 'number' as const, exclusiveMinimum: 0, exclusiveMaximum: 1 },
  },
};

const numbers = z.array(z.number());
const values = z.array(z.number().nullable());

/** The contract's result. */
export const resultSchema = z
  .looseObject({
    periods: z.array(z.string()),
    expected_growth: numbers,
    growth: numbers,
    surprise: numbers,
    forecast_se: values,
    parameter_variance: values,
    standardised_surprise: values,
    cumulated_surprise: values,
    order: z.array(z.int()).nullable(),
    slope: z.looseObject({ method: z.string(), lambda: z.number(), within_model: z.boolean() }),
    gap: values.nullable(),
    gap_lower: values.nullable(),
    gap_upper: values.nullable(),
    inflation: z
      .object({
        actual: values,
        expected_money: values,
        current_surprise: values,
        carry_over: values,
        unexplained: values,
      })
      .nullable(),
    diagnostics: z.looseObject({}),
    benchmarks: z.looseObject({ periods: z.array(z.string()) }).nullable(),
    warnings: z.array(z.string()),
  })
  .openapi('Result');
