import {
  growthPercent,
  monthName,
  periodLabel,
  signed,
  unsigned,
} from '../src/lib/charts/figures.ts';
import { addPeriods } from '../src/lib/econ/periods.ts';
import type { Assumptions, ComputeResult } from '../src/lib/econ/types.ts';
import {
  gapSentence as gapNotice,
  hasPersistence,
  timingSentence,
} from '../src/lib/services/releases/sentences.ts';
import { type Reading, readLastMonth } from './reading.ts';
import {
  atStart,
  bandInWords,
  countInWords,
  logPoints,
  perCent,
  pick,
  placeInWords,
  points,
  possessive,
} from './words.ts';

/** A record is worth a sentence when nothing like it happened for so many months. */
const MONTHS_TO_RECORD = 18;
const MONTHS_TO_RUN = 3;

export interface ReleaseWords {
  headline: string;
  explainer: string;
}

/** Whose release it is, and what was computed for it. */
export interface ReleaseToWrite {
  code: string;
  nameInText: string;
  period: string;
  result: ComputeResult;
  assumptions: Pick<Assumptions, 'gap' | 'expectation'>;
}

interface Context extends ReleaseToWrite {
  month: string;
  previousMonth: string;
  reading: Reading;
}

/** Headline and explainer of a release, every figure in them taken from its result. */
export function releaseWords(release: ReleaseToWrite): ReleaseWords {
  const context: Context = {
    ...release,
    month: monthOf(release.period),
    previousMonth: monthOf(addPeriods(release.period, -1)),
    reading: readLastMonth(release.result),
  };
  const sentences = [
    growthSentence(context),
    sizeSentence(context),
    gapSentence(context),
    lastSentence(context),
  ];
  return {
    headline: headline(context),
    explainer: sentences.filter((sentence) => sentence !== '').join(' '),
  };
}

function monthOf(period: string): string {
  return monthName(Number(period.slice(5, 7)));
}

function headline({ code, period, nameInText, month, reading }: Context): string {
  const { surprise, side, growth, monthsOnSide } = reading;
  const owner = atStart(possessive(nameInText));
  const key = `${code} ${period} headline`;
  if (printsBelowZero(growth)) {
    const fall = `Money in ${nameInText} fell ${perCent(growthPercent(growth), 2)} in ${month}`;
    return side === 'level'
      ? `${fall}, as expected`
      : `${fall}, ${points(surprise)} ${side} expectation`;
  }
  if (side === 'level') {
    return pick(key, [
      `${owner} money grew almost exactly as expected in ${month}`,
      `${atStart(nameInText)} was level in ${month}: money grew as expected`,
      `Money growth in ${nameInText} was level with expectation in ${month}`,
    ]);
  }
  const pace = side === 'above' ? 'faster' : 'more slowly';
  const forms: [string, ...string[]] = [
    `Money growth in ${nameInText} was ${points(surprise)} ${side} expectation in ${month}`,
  ];
  if (!printsZero(growth)) {
    forms.push(
      `${owner} money grew ${points(surprise)} ${pace} than expected in ${month}`,
      `Money in ${nameInText} grew ${points(surprise)} ${pace} than expected in ${month}`,
    );
  }
  if (monthsOnSide >= MONTHS_TO_RUN && monthsOnSide <= 12) {
    forms.push(
      `Money in ${nameInText} has been ${side} expectation for ${countInWords(monthsOnSide)} months`,
    );
  }
  return pick(key, forms);
}

function growthSentence(context: Context): string {
  const { code, period, month, previousMonth, assumptions, reading } = context;
  const { growth, expected } = reading;
  const hasSeasons = assumptions.expectation.seasonal === 'dummies';
  const money = hasSeasons ? 'broad money, not seasonally adjusted,' : 'broad money';
  const moved = movement(atStart(money), growth);
  const was = `${expectation(expected)} was expected${hasSeasons ? ' at this time of year' : ''}`;
  return pick(`${code} ${period} growth`, [
    `${moved} on the month; ${was}.`,
    `${moved} in ${month}, where ${was}.`,
    `${movement(`From ${previousMonth} to ${month} ${money}`, growth)}; ${was}.`,
  ]);
}

function expectation(growth: number): string {
  if (printsZero(growth)) return 'no change';
  return `${growth < 0 ? 'a fall' : 'growth'} of ${perCent(growthPercent(growth), 2)}`;
}

/** "Broad money rose 1.15 per cent", or fell, or did not change, judged by the figure that is printed. */
function movement(what: string, growth: number): string {
  const size = growthPercent(growth);
  if (printsZero(growth)) return `${what} did not change`;
  return `${what} ${size > 0 ? 'rose' : 'fell'} ${perCent(size, 2)}`;
}

function printsZero(growth: number): boolean {
  return Number(growthPercent(growth).toFixed(2)) === 0;
}

function printsBelowZero(growth: number): boolean {
  return Number(growthPercent(growth).toFixed(2)) < 0;
}

function sizeSentence(context: Context): string {
  const { code, period, reading } = context;
  const { side, surprise, standardised, cumulated, monthsOnSide } = reading;
  if (side === 'level') return levelSentence(context);
  const { largestSince } = reading;
  if (largestSince && largestSince.months >= MONTHS_TO_RECORD) {
    const month = periodLabel(largestSince.period);
    const since = largestSince.isFirst ? `since the series begins in ${month}` : `since ${month}`;
    return `The surprise, ${logPoints(surprise)}, is the largest ${side} expectation ${since}.`;
  }
  const place = placeInWords(monthsOnSide);
  if (monthsOnSide >= MONTHS_TO_RUN && place) {
    return `The surprise, ${logPoints(surprise)}, is the ${place} in a row ${side} expectation.`;
  }
  const forms: string[] = [];
  if (standardised !== null) forms.push(typicalSize(surprise, standardised));
  if (cumulated !== null) forms.push(`${sentenceOfYear(surprise, cumulated)}`);
  const [first, ...others] = forms;
  return first ? pick(`${code} ${period} size`, [first, ...others]) : '';
}

function typicalSize(surprise: number, standardised: number): string {
  const size = Math.abs(standardised);
  const start = `The surprise, ${logPoints(surprise)}, is`;
  if (size < 0.95) return `${start} smaller than a typical month’s.`;
  if (size < 1.05) return `${start} about the size of a typical month’s.`;
  return `${start} ${unsigned(size, 1)} times the size of a typical month’s.`;
}

function sentenceOfYear(surprise: number, cumulated: number): string {
  const start = `The surprise is ${logPoints(surprise)}`;
  if (Number(cumulated.toFixed(2)) === 0) {
    return `${start}; those of the last twelve months cancel out.`;
  }
  return `${start}; those of the last twelve months sum to ${logPoints(cumulated)}.`;
}

function levelSentence({ code, period, reading: { surprise, cumulated } }: Context): string {
  const size = logPoints(surprise);
  const forms: [string, ...string[]] = [
    `The surprise is ${size}, too small to be told from none.`,
    `What nobody expected comes to ${size}, which counts as level.`,
  ];
  if (cumulated !== null) {
    forms.push(
      `The surprise is ${size}, which counts as level; those of the last twelve months sum to ${logPoints(cumulated)}.`,
    );
  }
  return pick(`${code} ${period} size`, forms);
}

function gapSentence(context: Context): string {
  const { nameInText, assumptions, result, reading } = context;
  const notice = gapNotice(result, nameInText);
  if (notice) return notice;
  if (reading.gap === null) return '';
  const { value, lower, upper } = reading.gap;
  const band =
    lower !== null && upper !== null ? `, within a band of ${bandInWords(lower, upper)}` : '';
  if (!hasPersistence(assumptions)) {
    return `The same-month output effect of the surprise is ${perCent(value, 1)} ${sideOfTrend(value)}${band}.`;
  }
  return `${gapInWords(context, value)}${band}.`;
}

function gapInWords({ code, period, reading: { side } }: Context, value: number): string {
  const key = `${code} ${period} gap`;
  const there = whereOutputIs(value);
  const opposite = (side === 'above' && value < 0) || (side === 'below' && value > 0);
  if (opposite && Number(value.toFixed(1)) !== 0) {
    return pick(key, [
      `Earlier months still weigh more: the model implies output ${there}`,
      `Together with what is left of earlier surprises, the model nevertheless reads output as ${there}`,
    ]);
  }
  return pick(key, [
    `The model implies output ${there}`,
    `With what is left of earlier surprises, the model reads this as output ${there}`,
    `Read through the supply curve, this and earlier surprises imply output ${there}`,
  ]);
}

function whereOutputIs(value: number): string {
  if (Number(value.toFixed(1)) === 0) return 'at trend';
  return `${perCent(value, 1)} ${sideOfTrend(value)}`;
}

function sideOfTrend(value: number): string {
  return value < 0 ? 'below trend' : 'above trend';
}

function lastSentence({ code, nameInText, period, month, result, reading }: Context): string {
  const { inflation, pricesIgnoreMoney } = reading;
  const timing = timingSentence(period);
  if (gapNotice(result, nameInText)) {
    // "They" are the prices that the notice begins with.
    return pricesIgnoreMoney && result.slope.within_model
      ? 'They show no detectable response to money within the month.'
      : timing;
  }
  if (inflation === null) return timing;
  const prices = movement('Consumer prices', inflation.actual);
  const parts = `expected money less trend gives ${logPoints(inflation.expectedMoney)} of inflation and the surprise ${signed(inflation.currentSurprise, 2)}, with ${signed(inflation.unexplained, 2)} unexplained`;
  return pick(`${code} ${period} last`, [
    `${prices} in ${month}: ${parts}.`,
    `${prices}; ${parts}.`,
    timing,
  ]);
}
