import type { DemoSpecification } from './economy.ts';

/** The output share as the slope b the computation takes: λ = b/(1+b). */
function slopeOf(lambda: number): number {
  return lambda / (1 - lambda);
}

/** How many of the newest months second versions hold for: this month's release and the one before. */
const SECOND_VERSION_MONTHS = 2;

const aldermark: DemoSpecification[] = [
  {
    assumptions: {
      expectation: {
        rule: 'autoregression',
        order: 1,
        seasonal: 'none',
        window: { kind: 'expanding', length: 120 },
      },
      slope: { method: 'prices' },
      gap: { persistence: 0.93 },
      confidence: 0.8,
    },
    reason:
      'First version. One lag describes money growth here; the output share is estimated from prices over all months; persistence is set at 0.93.',
  },
  {
    newestMonths: SECOND_VERSION_MONTHS,
    assumptions: {
      expectation: {
        rule: 'autoregression',
        order: { criterion: 'bic', max: 6 },
        seasonal: 'none',
        window: { kind: 'expanding', length: 120 },
      },
      slope: { method: 'prices' },
      gap: { persistence: 'estimated' },
      confidence: 0.8,
    },
    reason:
      'Two changes. How many past months the expectation looks at is no longer set at one: the Bayesian information criterion chooses it anew for every month, up to six, from earlier months alone. Persistence is estimated from activity instead of set at 0.93, and the band of the gap allows for the error of that. The output share is estimated from prices over all months, as before.',
  },
];

const brannochIsles: DemoSpecification[] = [
  {
    assumptions: {
      expectation: {
        rule: 'autoregression',
        order: 1,
        seasonal: 'none',
        window: { kind: 'rolling', length: 180 },
      },
      slope: { method: 'fixed', b: slopeOf(0.6), se_lambda: 0.06 },
      gap: { persistence: 0.95 },
      confidence: 0.8,
    },
    reason:
      'First version. Money is an end-of-month figure and prices are averages, so an output share estimated from prices would be too large: 0.60 with a standard error of 0.06 is assumed instead. The expectation learns from the last fifteen years; persistence is set at 0.95.',
  },
  {
    newestMonths: SECOND_VERSION_MONTHS,
    assumptions: {
      expectation: {
        rule: 'autoregression',
        order: 1,
        seasonal: 'none',
        window: { kind: 'rolling', length: 180 },
      },
      slope: { method: 'activity' },
      gap: { persistence: 'estimated' },
      confidence: 0.8,
    },
    reason:
      'The output share and persistence are no longer set: both are estimated from activity over all months. Prices remain a poor source for the output share, because money is an end-of-month figure and they are averages. The expectation learns from the last fifteen years, as before.',
  },
];

const costaLirra: DemoSpecification[] = [
  {
    assumptions: {
      expectation: {
        rule: 'autoregression',
        order: 2,
        seasonal: 'none',
        window: { kind: 'rolling', length: 120 },
      },
      slope: { method: 'prices', window: { length: 120 } },
      gap: { persistence: 0.9 },
      confidence: 0.8,
    },
    reason:
      'First version. Money has been less steady for some years, and the output share with it: both the expectation and the output share look back ten years and no further. Persistence is set at 0.90.',
  },
  {
    newestMonths: SECOND_VERSION_MONTHS,
    assumptions: {
      expectation: {
        rule: 'autoregression',
        order: 2,
        seasonal: 'none',
        window: { kind: 'rolling', length: 120 },
      },
      slope: { method: 'prices', window: { length: 120 } },
      gap: { persistence: 'estimated' },
      confidence: 0.8,
    },
    reason:
      'Persistence is estimated from activity over all months instead of set at 0.90. The expectation and the output share look back ten years, as before.',
  },
];

/** One version only: what the desk would change elsewhere, it would leave as it is here. */
const dunmere: DemoSpecification[] = [
  {
    assumptions: {
      expectation: {
        rule: 'autoregression',
        order: 2,
        seasonal: 'none',
        window: { kind: 'expanding', length: 120 },
      },
      slope: { method: 'fixed', b: slopeOf(0.08), se_lambda: 0.03 },
      gap: { persistence: 0.85 },
      confidence: 0.8,
    },
    reason:
      'First version. Where prices rise this fast, surprises reach them almost at once: an output share of 0.08 with a standard error of 0.03 is assumed, and a persistence of 0.85.',
  },
];

const estavel: DemoSpecification[] = [
  {
    assumptions: {
      expectation: {
        rule: 'autoregression',
        order: 1,
        seasonal: 'none',
        window: { kind: 'expanding', length: 120 },
      },
      slope: { method: 'prices' },
      gap: { persistence: 0.9 },
      confidence: 0.8,
    },
    reason:
      'First version. One lag describes money growth here; prices hardly answer to money within the month, and the neutrality test says so on every release. Persistence is set at 0.90.',
  },
  {
    newestMonths: SECOND_VERSION_MONTHS,
    assumptions: {
      expectation: {
        rule: 'autoregression',
        order: 1,
        seasonal: 'none',
        window: { kind: 'expanding', length: 120 },
      },
      slope: { method: 'prices' },
      gap: { persistence: 'estimated' },
      confidence: 0.8,
    },
    reason:
      'Persistence is estimated from activity instead of set at 0.90. The neutrality test rejects the model here with either, so the gap stays an assumption.',
  },
];

/** Unadjusted figures need indicators from the first month on, so there is no earlier version to replace. */
const farrowland: DemoSpecification[] = [
  {
    assumptions: {
      expectation: {
        rule: 'autoregression',
        order: 1,
        seasonal: 'dummies',
        window: { kind: 'expanding', length: 120 },
      },
      slope: { method: 'prices' },
      gap: { persistence: 'estimated' },
      confidence: 0.8,
    },
    reason:
      'First version. No figure of Farrowland is seasonally adjusted, so the expectation and every estimate allow for the month of the year; beyond that one lag describes money growth. The output share is estimated from prices and persistence from activity, both over all months.',
  },
];

/** The versions of each economy's specification, oldest first. */
export const specifications = {
  XAL: aldermark,
  XBR: brannochIsles,
  XCL: costaLirra,
  XDU: dunmere,
  XES: estavel,
  XFA: farrowland,
};
