import { side } from '../../lib/charts/figures.ts';
import { periodLabel, periodNoun } from '../../lib/charts/periodLabels.ts';
import type { Facts } from '../../lib/econ/facts.ts';
import { periodDifference } from '../../lib/econ/periods.ts';
import { numberWord } from './counting.ts';

/** Shorter than this a run is no news. */
const leastRun = 3;

/** A record is worth saying when nothing like it happened for so many periods. */
const leastSince = 12;

/** "1st", "2nd", "3rd", "11th", "112th". */
export function ordinal(number: number): string {
  const tens = number % 100;
  const ending = tens > 10 && tens < 14 ? 'th' : (['th', 'st', 'nd', 'rd'][number % 10] ?? 'th');
  return `${number}${ending}`;
}

/** How the newest surprise stands in its history; each sentence names the periods that prove it. */
export function historyWords({ period, surprise }: Pick<Facts, 'period' | 'surprise'>): string {
  const { value, largest_since: since, run, rank } = surprise;
  const where = side(value);
  const noun = periodNoun(period);
  const sentences: string[] = [];
  if (where !== 'level' && since) {
    if (since.period === null) {
      sentences.push(
        `The farthest ${where} expectation since ${periodLabel(since.from)}, where the history begins.`,
      );
    } else if (periodDifference(since.period, period) >= leastSince) {
      sentences.push(`The farthest ${where} expectation since ${periodLabel(since.period)}.`);
    }
  }
  if (where !== 'level' && run && run.periods >= leastRun) {
    sentences.push(
      `Growth has been ${where} expectation for ${numberWord(run.periods)} ${noun}s, from ${periodLabel(run.from)} on.`,
    );
  }
  sentences.push(
    `By size it ranks ${ordinal(rank.by_size)} of the ${rank.of} ${noun}s since ${periodLabel(rank.from)}.`,
  );
  return sentences.join(' ');
}
