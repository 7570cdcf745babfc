import { gapFigure, range, side, surpriseFigure } from '../../lib/charts/figures.ts';
import { periodLabel, periodNoun } from '../../lib/charts/periodLabels.ts';
import { capitalised, possessive } from './counting.ts';
import type { Reading } from './reading.ts';
import { againstTrend } from './standfirst.ts';

/**
 * Sentences that can be quoted as they stand, each with its size, period and source: one on the surprise and one on
 * what it implies for output. `notice` is what must be said of the gap instead where it is no ordinary estimate.
 */
export function quotable(reading: Reading, nameInText: string, notice: string | null): string[] {
  const sentences = [surpriseSentence(reading, nameInText)];
  if (notice !== null) sentences.push(notice);
  else if (reading.standing === 'estimate') sentences.push(gapSentence(reading, nameInText));
  return sentences;
}

function surpriseSentence({ surprise, period }: Reading, nameInText: string): string {
  const where = side(surprise);
  const size = surpriseFigure(Math.abs(surprise)).replace('+', '');
  const relation =
    where === 'level' ? 'level with expectation' : `${size} percentage points ${where} expectation`;
  return `${capitalised(possessive(nameInText))} money growth was ${relation} in ${periodLabel(period)}, according to Slackwater.`;
}

function gapSentence(reading: Reading, nameInText: string): string {
  const { gap, lower, upper, period, persistent } = reading;
  const band =
    lower === null || upper === null ? '' : `, within a band of ${range(lower, upper)} per cent`;
  const output = persistent
    ? `output in ${nameInText} ${againstTrend(gap ?? 0)} in ${periodLabel(period)}`
    : `a same-${periodNoun(period)} effect on output in ${nameInText} of ${gapFigure(gap)} per cent in ${periodLabel(period)}`;
  return `Slackwater’s model implies ${output}${band}; it is not a measurement of output.`;
}
