import { normalCdf } from '../distributions/normal.ts';

/** Which deterministic terms a Dickey–Fuller regression has. */
export type Deterministic = 'constant' | 'constant_and_trend';

interface ApproximateP {
  max: number;
  min: number;
  star: number;
  small: readonly number[];
  large: readonly number[];
}

/** MacKinnon (1994, J. Business & Economic Statistics 12:167–176), tables 3 and 4, one variable. */
const APPROXIMATE_P: Record<Deterministic, ApproximateP> = {
  constant: {
    max: 2.74,
    min: -18.83,
    star: -1.61,
    small: [2.1659, 1.4412, 0.038269],
    large: [1.7339, 0.93202, -0.12745, -0.010368],
  },
  constant_and_trend: {
    max: 0.7,
    min: -16.18,
    star: -2.89,
    small: [3.2512, 1.6047, 0.049588],
    large: [2.5261, 0.61654, -0.37956, -0.060285],
  },
};

/** MacKinnon (2010, Queen's Economics Department Working Paper 1227), table 2: b0 + b1/n + b2/n² + b3/n³. */
const CRITICAL: Record<Deterministic, Record<'1%' | '5%' | '10%', readonly number[]>> = {
  constant: {
    '1%': [-3.43035, -6.5393, -16.786, -79.433],
    '5%': [-2.86154, -2.8903, -4.234, -40.04],
    '10%': [-2.56677, -1.5384, -2.809, 0],
  },
  constant_and_trend: {
    '1%': [-3.95877, -9.0531, -28.428, -134.155],
    '5%': [-3.41049, -4.3904, -9.036, -45.374],
    '10%': [-3.12705, -2.5856, -3.925, -22.38],
  },
};

/** MacKinnon's approximate asymptotic p-value of a Dickey–Fuller statistic; 1 above and 0 below his table's range. */
export function dickeyFullerP(statistic: number, terms: Deterministic): number {
  const table = APPROXIMATE_P[terms];
  if (statistic > table.max) return 1;
  if (statistic < table.min) return 0;
  return normalCdf(polynomial(statistic <= table.star ? table.small : table.large, statistic));
}

/** Critical values of a Dickey–Fuller statistic for n observations in its regression. */
export function dickeyFullerCritical(n: number, terms: Deterministic) {
  const at = (level: '1%' | '5%' | '10%') => polynomial(CRITICAL[terms][level], 1 / n);
  return { '1%': at('1%'), '5%': at('5%'), '10%': at('10%') };
}

/** Value of a polynomial, lowest power first. */
function polynomial(coefficients: readonly number[], x: number): number {
  return coefficients.reduceRight((value, coefficient) => value * x + coefficient, 0);
}
