import { unsigned } from '../../lib/charts/figures.ts';
import { periodNoun } from '../../lib/charts/periodLabels.ts';
import type { ComputeRequest, ComputeResult } from '../../lib/econ/types.ts';
import { pValue, shareInterval } from './assumptions.ts';
import { GATE_LEVEL } from '../../lib/econ/diagnostics/gate.ts';
import { isGapAssumption } from '../../lib/services/releases/sentences.ts';
import { persistenceInUse } from './reading.ts';

/** One thing the data say about the model: in words first, then the numbers. */
export interface Finding {
  title: string;
  words: string;
  numbers: string;
}

/** What the data say about the model: its own test, the response of prices, the output share. */
export function findings(
  { request, result }: { request: ComputeRequest; result: ComputeResult },
  nameInText: string,
): Finding[] {
  return [
    neutrality(request, result, nameInText),
    noResponse(result, nameInText),
    outputShare(request, result),
    calibration(result),
  ].filter((finding) => finding !== null);
}

function neutrality(
  request: ComputeRequest,
  result: ComputeResult,
  nameInText: string,
): Finding | null {
  const title = 'The model’s own test';
  const test = result.diagnostics.neutrality;
  if (!test) {
    return {
      title,
      words: 'Not made: there are no prices to test the model against.',
      numbers: '',
    };
  }
  if (test.p === null || test.statistic === null) {
    return { title, words: `Not made: ${reasonWords(test.reason)}.`, numbers: '' };
  }
  const { rule } = request.expectation;
  const restrictions =
    rule === 'adaptive' || rule === 'survey' ? 2 : (test.coefficients?.length ?? 1) - 1;
  const numbers = `Wald statistic ${unsigned(test.statistic, 1)} on ${restrictions} restriction${
    restrictions === 1 ? '' : 's'
  }, ${pValue(test.p)}.`;
  if (!isGapAssumption(result)) {
    return {
      title,
      words:
        `The model says that money which was expected moves prices one for one. Prices in ${nameInText} ` +
        `do not contradict it at the ${100 * GATE_LEVEL}% level.${blindSpot(request)}`,
      numbers,
    };
  }
  return {
    title,
    words:
      `The model says that money which was expected moves prices one for one. Prices in ${nameInText} ` +
      `contradict it at the ${100 * GATE_LEVEL}% level, so the gap is not published as an estimate.${weakness(request, result)}`,
    numbers,
  };
}

function reasonWords(reason: string | null): string {
  if (reason === 'persistence') return 'it needs a persistence the model allows';
  if (reason === 'collinear') return 'its terms cannot be told apart in these data';
  if (reason === 'too few') return 'there are too few observations';
  return 'it has no value';
}

/** The test looks past an economy whose output answers to all money growth when the rule is a random walk. */
function blindSpot({ expectation }: ComputeRequest): string {
  return expectation.rule === 'random_walk'
    ? ' Under a random walk the test cannot tell this from an economy whose output answers to all money growth, expected or not.'
    : '';
}

/** With many lags on a short sample the test rejects too often, and the page says so beside a rejection. */
function weakness({ expectation }: ComputeRequest, result: ComputeResult): string {
  if (expectation.rule !== 'autoregression') return '';
  const lags =
    typeof expectation.order === 'number' ? expectation.order : (result.order?.at(-1) ?? 0);
  return lags > 4 && result.periods.length < 240
    ? ' With this many lags on a sample this short the test rejects a true model too often.'
    : '';
}

function noResponse({ slope }: ComputeResult, nameInText: string): Finding | null {
  if (!slope.no_response) return null;
  const { t } = slope.no_response;
  const detects = Math.abs(t) >= 2;
  return {
    title: 'Whether prices respond at all',
    words: detects
      ? `Prices that ignored money would give an output share of 1. Prices in ${nameInText} respond within the period: the estimate differs from 1 by more than two standard errors.`
      : `Prices in ${nameInText} show no detectable response to money within the period: the estimate cannot be told from 1, which prices that ignore money would give.`,
    numbers: `t\u00a0=\u00a0${unsigned(t, 1)} against an output share of 1.`,
  };
}

function outputShare(request: ComputeRequest, result: ComputeResult): Finding {
  const { slope } = result;
  const title = 'Output share';
  const interval = shareInterval(slope);
  const numbers = `${unsigned(slope.lambda, 2)}${interval === null ? '' : `, 80% interval ${interval}`}.`;
  const rho = persistenceInUse(request, result);
  if (!slope.within_model) {
    const what =
      slope.lambda > 0 && slope.lambda < 1
        ? `The persistence, ${rho === null ? 'unknown' : unsigned(rho, 2)}, lies outside the model, which needs 0 or more and less than 1`
        : `The estimated output share, ${unsigned(slope.lambda, 2)}, lies outside the model, which needs a value between 0 and 1`;
    return { title, words: `${what}. No gap is published from it.`, numbers };
  }
  const share = unsigned(slope.lambda, 2);
  const rest = unsigned(1 - slope.lambda, 2);
  const lead = isGapAssumption(result)
    ? 'If the model held'
    : request.slope.method === 'fixed'
      ? 'As the desk assumes'
      : 'As estimated';
  const noun = periodNoun(result.periods[0]!);
  return {
    title,
    words: `${lead}, of a surprise of 1 point ${share} goes into output within the ${noun} and ${rest} into prices.`,
    numbers,
  };
}

function calibration({ diagnostics }: ComputeResult): Finding | null {
  const { surprise, ljung_box } = diagnostics;
  if (!surprise || surprise.mean_t === null) return null;
  const centred = Math.abs(surprise.mean_t) < 2;
  const pattern = (ljung_box?.p ?? 1) < GATE_LEVEL;
  const words =
    `Over the whole history the surprises ${centred ? 'average out' : 'do not average out'}` +
    (pattern
      ? ', and one can be told in part from those before it: the rule leaves something to be learned.'
      : ', and one cannot be told from those before it.');
  const test =
    ljung_box?.p == null ? '' : ` Ljung–Box over ${ljung_box.lags} lags: ${pValue(ljung_box.p)}.`;
  return {
    title: 'The expectation rule',
    words: ljung_box?.p == null ? words.replace(/, and .*$/, '.') : words,
    numbers: `Mean surprise ${unsigned(surprise.mean, 2)}\u00a0pp, t\u00a0=\u00a0${unsigned(surprise.mean_t, 1)}.${test}`,
  };
}
