import {
  gapFigure,
  growthFigure,
  growthSize,
  growthPercent,
  range,
} from '../../lib/charts/figures.ts';
import { periodNoun } from '../../lib/charts/periodLabels.ts';
import type { Reading } from './reading.ts';

/** "rose 1.15 per cent" or "fell 0.32 per cent", from log points. */
export function moved(growth: number): string {
  const figure = growthSize(growth);
  if (growthFigure(growth) === growthFigure(0)) return 'was unchanged';
  return `${growth < 0 ? 'fell' : 'rose'} ${figure} per cent`;
}

/** "0.6 per cent above trend", "level with trend". */
export function againstTrend(gap: number): string {
  if (gapFigure(gap) === gapFigure(0)) return 'level with trend';
  const figure = gapFigure(Math.abs(gap)).replace('+', '');
  return `${figure} per cent ${gap > 0 ? 'above' : 'below'} trend`;
}

/**
 * The lines under an explainer's headline: what money did, what was expected and, where a gap is published as an
 * estimate, what the model implies. A gap that is an assumption never leads.
 */
export function explainerStandfirst(reading: Reading, moneyTitle: string): string {
  const noun = periodNoun(reading.period);
  const sentences = [
    `${moneyTitle} ${moved(reading.growth)} on the ${noun}; ${expectation(reading)} was expected.`,
  ];
  const { gap, lower, upper } = reading;
  if (reading.standing === 'estimate' && gap !== null) {
    const band =
      lower === null || upper === null ? '' : `, within a band of ${range(lower, upper)} per cent`;
    sentences.push(
      reading.persistent
        ? `The model reads that as output ${againstTrend(gap)}${band}.`
        : `The model reads that as a same-${noun} effect on output of ${gapFigure(gap)} per cent${band}.`,
    );
  }
  return sentences.join(' ');
}

/** What was expected as running text: "0.31 per cent", "growth of 0.39 per cent" where money fell, "a fall of 0.10 per cent". */
export function expectation({ growth, expected }: Pick<Reading, 'growth' | 'expected'>): string {
  const figure = `${growthSize(expected)} per cent`;
  const falls = growthPercent(expected) < 0;
  if (falls) return growth < 0 ? figure : `a fall of ${figure}`;
  return growth < 0 ? `growth of ${figure}` : figure;
}
