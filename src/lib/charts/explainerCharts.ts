import { gapChart, gapDomain, shownGaps } from './gapChart.ts';
import type { GapData } from './gapLines.ts';
import type { GapChartOptions } from './gapChart.ts';
import { shownSurprises, surpriseChart, surpriseDomain } from './surpriseChart.ts';
import type { SurpriseData } from './surpriseData.ts';
import type { Chart } from './svg.ts';

export interface ExplainerChartsOptions extends Omit<GapChartOptions, 'data' | 'domain'> {
  /** A whole result, or what the two charts need of it. */
  data: SurpriseData & GapData;
}

/**
 * The surprise and the gap, each `width` px wide, over the same periods and with equal pixels per unit. From
 * 480 px on they may stand side by side: their datums are at the same height.
 */
export function explainerCharts(options: ExplainerChartsOptions): { surprise: Chart; gap: Chart } {
  const { data, width, rejected, idPrefix } = options;
  const gaps = shownGaps(data, width, options.count);
  const count = gaps.periods.length;
  const domain = Math.max(
    surpriseDomain(shownSurprises(data, width, count)),
    gapDomain(gaps, rejected),
  );
  const shared = { ...options, count, domain };
  return {
    surprise: surpriseChart({ ...shared, idPrefix: `${idPrefix}-surprise` }),
    gap: gapChart({ ...shared, idPrefix: `${idPrefix}-gap` }),
  };
}
