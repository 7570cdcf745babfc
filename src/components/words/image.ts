import { gapFigure, growthFigure, side, surpriseFigure } from '../../lib/charts/figures.ts';
import { periodLabel } from '../../lib/charts/periodLabels.ts';
import { shortCaution } from '../frame/cautions.ts';
import type { Reading } from './reading.ts';

/** What the wide image of a surprise shows, for those who cannot see it. */
export function imageAlternative(reading: Reading, economyName: string): string {
  const where = side(reading.surprise);
  const relation = where === 'level' ? 'level with' : where;
  return (
    `${economyName}, ${periodLabel(reading.period)}: money surprise ${surpriseFigure(reading.surprise)} percentage points, ` +
    `${relation} expectation. Money growth was ${growthFigure(reading.growth)} per cent; ` +
    `${growthFigure(reading.expected)} per cent was expected. Bars show the surprises of the last two years. ${shortCaution}`
  );
}

/** The caption to print under the image. */
export function imageCaption(reading: Reading, economyName: string): string {
  const gap =
    reading.standing === 'estimate' && reading.persistent
      ? ` The implied output gap is ${gapFigure(reading.gap)} per cent.`
      : '';
  return (
    `Money surprise in ${economyName}, ${periodLabel(reading.period)}: ${surpriseFigure(reading.surprise)} percentage points.` +
    `${gap} ${shortCaution} Source: Slackwater, CC BY 4.0.`
  );
}
