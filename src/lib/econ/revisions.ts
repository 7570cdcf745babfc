import { mean, sampleVariance } from './moments.ts';

/** How the published values of one period changed. */
export interface PeriodRevision {
  period: string;
  first: number;
  latest: number;
  /** latest − first. */
  revision: number;
}

/** Revision statistics over periods (method, section 7), in the unit of the values; null where they do not exist. */
export interface RevisionStatistics {
  periods: PeriodRevision[];
  mean_revision: number | null;
  mean_absolute_revision: number | null;
  /** Divisor n − 1. */
  sd_revision: number | null;
  /** Share of periods whose first and latest values differ in sign; the sign of zero is 0, and a change of it counts. */
  share_of_sign_changes: number | null;
  /** Standard deviation of revisions over that of latest values. */
  noise_to_signal: number | null;
}

/**
 * Revision statistics of published values.
 * @param published For each period, every published value from the first to the latest; a period without one is left out.
 */
export function revisions(
  published: Readonly<Record<string, readonly number[]>>,
): RevisionStatistics {
  const periods: PeriodRevision[] = Object.entries(published)
    .filter(([, values]) => values.length > 0)
    .map(([period, values]) => {
      const first = values[0]!;
      const latest = values[values.length - 1]!;
      return { period, first, latest, revision: latest - first };
    });
  if (periods.length === 0) {
    return {
      periods,
      mean_revision: null,
      mean_absolute_revision: null,
      sd_revision: null,
      share_of_sign_changes: null,
      noise_to_signal: null,
    };
  }
  const changes = periods.map(({ revision }) => revision);
  const noise = deviation(changes);
  const signal = deviation(periods.map(({ latest }) => latest));
  const turned = periods.filter(({ first, latest }) => Math.sign(first) !== Math.sign(latest));
  return {
    periods,
    mean_revision: mean(changes),
    mean_absolute_revision: mean(changes.map((change) => Math.abs(change))),
    sd_revision: noise,
    share_of_sign_changes: turned.length / periods.length,
    noise_to_signal: noise === null || signal === null || signal === 0 ? null : noise / signal,
  };
}

function deviation(values: readonly number[]): number | null {
  const variance = sampleVariance(values);
  return variance === null ? null : Math.sqrt(variance);
}
