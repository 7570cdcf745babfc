import exp from '@stdlib/math-base-special-exp';

export type DecimalMark = '.' | ',';

export interface FigureOptions {
  /** What stands before the decimals; a point unless told. */
  decimalMark?: DecimalMark;
}

export type Side = 'above' | 'below' | 'level';

export type Unit = 'pp' | '%' | 's.d.';

export const minus = '\u2212';
export const noBreakSpace = '\u00a0';

/** What stands in a table where there is no figure. */
export const noFigure = '\u2013';

/** Surprises smaller than this, in percentage points, are called level. */
export const levelBelow = 0.05;

function digits(value: number, places: number, options: FigureOptions): string {
  const text = Math.abs(value).toFixed(places);
  return options.decimalMark === ',' ? text.replace('.', ',') : text;
}

function roundsToZero(value: number, places: number): boolean {
  return Number(value.toFixed(places)) === 0;
}

/**
 * A figure that always shows its sign (+ or U+2212), and none where it rounds to zero.
 * `value` in any unit; null, missing or not finite gives an en dash.
 */
export function signed(
  value: number | null | undefined,
  places: number,
  options: FigureOptions = {},
): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return noFigure;
  if (roundsToZero(value, places)) return digits(0, places, options);
  return (value > 0 ? '+' : minus) + digits(value, places, options);
}

/** A figure with a sign (U+2212) only where it is below zero; null, missing or not finite gives an en dash. */
export function unsigned(
  value: number | null | undefined,
  places: number,
  options: FigureOptions = {},
): string {
  return signed(value, places, options).replace(/^\+/, '');
}

/** A money surprise in pp (log points): "+0.84", "−0.71", "0.00". */
export function surpriseFigure(
  value: number | null | undefined,
  options: FigureOptions = {},
): string {
  return signed(value, 2, options);
}

/** An implied output gap or an end of its band, in per cent of output: "+0.6". */
export function gapFigure(value: number | null | undefined, options: FigureOptions = {}): string {
  return signed(value, 1, options);
}

/** A standardised surprise, in standard deviations: "+1.9". */
export function standardisedFigure(
  value: number | null | undefined,
  options: FigureOptions = {},
): string {
  return signed(value, 1, options);
}

/** A part of the inflation accounting, in log points: "+0.27". */
export function accountingFigure(
  value: number | null | undefined,
  options: FigureOptions = {},
): string {
  return signed(value, 2, options);
}

/** Log points as per cent growth: 100·(e^{d/100} − 1). */
export function growthPercent(logPoints: number): number {
  return 100 * (exp(logPoints / 100) - 1);
}

/** Growth of money or prices, from log points, printed in per cent: "1.15", "−0.32". */
export function growthFigure(
  logPoints: number | null | undefined,
  options: FigureOptions = {},
): string {
  return unsigned(typeof logPoints === 'number' ? growthPercent(logPoints) : null, 2, options);
}

/** The size of a growth rate, for words that say which way it went: "fell 0.72 per cent". From log points. */
export function growthSize(logPoints: number, options: FigureOptions = {}): string {
  return unsigned(Math.abs(growthPercent(logPoints)), 2, options);
}

/** Two ends of a range: "+0.2 to +1.0"; an en dash where either is missing. */
export function range(
  lower: number | null,
  upper: number | null,
  places = 1,
  options: FigureOptions = {},
): string {
  if (lower === null || upper === null) return noFigure;
  return `${signed(lower, places, options)} to ${signed(upper, places, options)}`;
}

/** A figure and its unit: no space before %, a no-break space before pp and s.d.; an en dash stays alone. */
export function withUnit(figure: string, unit: Unit): string {
  if (figure === noFigure) return figure;
  return unit === '%' ? `${figure}%` : `${figure}${noBreakSpace}${unit}`;
}

/** On which side of the datum a figure lies; below .05 in size it is level (and so is none at all). */
export function side(value: number | null | undefined): Side {
  if (value === null || value === undefined || !(Math.abs(value) >= levelBelow)) return 'level';
  return value > 0 ? 'above' : 'below';
}
/** Whether a figure printed with `places` decimals hangs from the datum: below 0; what prints as zero stands. */
export function hangs(value: number | null | undefined, places: number): boolean {
  return signed(value, places).startsWith(minus);
}

export { monthName, periodLabel, periodNoun } from './periodLabels.ts';
