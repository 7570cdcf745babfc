import {
  growthFigure,
  periodLabel,
  periodNoun,
  side,
  surpriseFigure,
  withUnit,
} from '../charts/figures.ts';
import type { FigureOptions } from '../charts/figures.ts';
import type { ShareImageInput } from './shareImage.ts';

/** The caution that stands on every image. */
export const shortCaution = 'Model-implied: not a measurement of output, not a forecast.';

/** A surprise without its sign: "±0.45 pp". */
export function typicalSize(error: number, options: FigureOptions): string {
  return withUnit(surpriseFigure(error, options).replace('+', '±'), 'pp');
}

function change(logPoints: number, options: FigureOptions): { size: string; sign: number } {
  const figure = growthFigure(logPoints, options);
  const size = figure.replace('−', '');
  return { size: `${size}%`, sign: /[1-9]/.test(size) ? Math.sign(logPoints) : 0 };
}

/** "Money grew 1.15%; growth of 0.31% expected": log points of money growth, actual and expected, in per cent. */
export function growthWords(growth: number, expected: number, options: FigureOptions): string {
  const actual = change(growth, options);
  const before = change(expected, options);
  const did =
    actual.sign > 0
      ? `Money grew ${actual.size}`
      : actual.sign < 0
        ? `Money fell ${actual.size}`
        : 'Money did not change';
  const was =
    before.sign > 0
      ? `growth of ${before.size}`
      : before.sign < 0
        ? `a fall of ${before.size}`
        : 'no change';
  return `${did}; ${was} expected`;
}

/** "Source: …; Slackwater method 1.4. CC BY 4.0". */
export function sourceLine(source: string, methodVersion: string): string {
  return `Source: ${source}; Slackwater method ${methodVersion}. CC BY 4.0`;
}

function relation(surprise: number): string {
  const where = side(surprise);
  return where === 'level' ? 'level' : `${where} expectation`;
}

/** Text alternative of the image: all it says, and the values it draws. */
export function alternativeText(input: ShareImageInput): string {
  const { economy, period, surprise, growth, expected, forecast_se, history } = input;
  const known = history.surprise.filter((value): value is number => value !== null);
  const figure = (value: number) => withUnit(surpriseFigure(value, input), 'pp');
  const sentences = [
    `${economy}, ${periodLabel(period)}: money surprise ${figure(surprise)}, ${relation(surprise)}.`,
    `${growthWords(growth, expected, input)}.`,
  ];
  const first = history.periods[0];
  if (first !== undefined && known.length > 0) {
    sentences.push(
      `Bars: surprises of ${history.periods.length} ${periodNoun(first)}s from ${periodLabel(first)},` +
        ` between ${figure(Math.min(...known))} and ${figure(Math.max(...known))}.`,
    );
  }
  if (forecast_se !== null) sentences.push(`Typical range ${typicalSize(forecast_se, input)}.`);
  return `${sentences.join(' ')} ${shortCaution}`;
}

/** What stands under the image where it is used: title, figures, caution, source and licence. */
export function captionText(input: ShareImageInput): string {
  const { title, economy, period, surprise, growth, expected, source, methodVersion } = input;
  const figure = withUnit(surpriseFigure(surprise, input), 'pp');
  const titled = /[.?!]$/.test(title) ? title : `${title}.`;
  return (
    `${titled} ${economy}, ${periodLabel(period)}: money surprise ${figure} (log points).` +
    ` ${growthWords(growth, expected, input)}. ${shortCaution} ${sourceLine(source, methodVersion)}.`
  );
}
