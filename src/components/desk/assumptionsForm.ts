import type { Typed } from './form.ts';

/** Fields of the form by their path in the assumptions, where the service's faults point. */
export const ASSUMPTION_FIELDS: Record<string, string> = {
  rule: 'assumptions/expectation/rule',
  order: 'assumptions/expectation/order',
  largestOrder: 'assumptions/expectation/order/max',
  gain: 'assumptions/expectation/gain',
  seasonal: 'assumptions/expectation/seasonal',
  windowKind: 'assumptions/expectation/window/kind',
  windowLength: 'assumptions/expectation/window/length',
  method: 'assumptions/slope/method',
  b: 'assumptions/slope/b',
  seLambda: 'assumptions/slope/se_lambda',
  slopeWindow: 'assumptions/slope/window/length',
  lags: 'assumptions/slope/lags',
  gamma: 'assumptions/slope/gamma',
  eta: 'assumptions/slope/eta',
  demandVariance: 'assumptions/slope/relative_demand_variance',
  moneyVariance: 'assumptions/slope/money_variance',
  persistence: 'assumptions/gap/persistence',
  confidence: 'assumptions/confidence',
};

/**
 * The contract's assumptions from the form. A field left empty is left out, and what is filled in stays even where
 * the rule does not use it: the service then names it, and nothing is dropped unseen.
 */
export function assumptionsOf(typed: Typed): unknown {
  const seasonal = typed.text('seasonal');
  const kind = typed.text('windowKind');
  const length = number(typed, 'windowLength');
  const slopeWindow = number(typed, 'slopeWindow');
  const persistence = typed.text('persistence').trim();
  const largest = number(typed, 'largestOrder');
  return {
    expectation: filled({
      rule: typed.text('rule'),
      order: largest === undefined ? number(typed, 'order') : { criterion: 'bic', max: largest },
      gain: number(typed, 'gain'),
      seasonal: seasonal || undefined,
      window:
        kind || length !== undefined ? filled({ kind: kind || undefined, length }) : undefined,
    }),
    slope: filled({
      method: typed.text('method'),
      b: number(typed, 'b'),
      se_lambda: number(typed, 'seLambda'),
      window: slopeWindow === undefined ? undefined : { length: slopeWindow },
      lags: number(typed, 'lags'),
      gamma: number(typed, 'gamma'),
      eta: number(typed, 'eta'),
      relative_demand_variance: number(typed, 'demandVariance'),
      money_variance: number(typed, 'moneyVariance'),
    }),
    gap: {
      persistence:
        persistence === '' || persistence === 'none' || persistence === 'estimated'
          ? persistence || 'none'
          : asNumber(persistence),
    },
    ...filled({ confidence: number(typed, 'confidence') }),
  };
}

/** A number, or the text itself, so that the service can say what it found. */
function number(typed: Typed, field: string): number | string | undefined {
  const text = typed.text(field).trim();
  return text === '' ? undefined : asNumber(text);
}

function asNumber(text: string): number | string {
  return Number.isFinite(Number(text)) ? Number(text) : text;
}

function filled(object: Record<string, unknown>): Record<string, unknown> {
  return Object.fromEntries(Object.entries(object).filter(([, value]) => value !== undefined));
}
