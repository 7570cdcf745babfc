import type { Values } from '../econ/types.ts';

/** What the chart shows of a result: arrays over `periods`, in log points; null where there is no value. */
export interface SurpriseData {
  periods: string[];
  surprise: Values;
  forecast_se: Values;
}

/** Share of periods, over the whole history, whose surprise lies within its own forecast standard error; null without any. */
export function shareInside({ surprise, forecast_se }: SurpriseData): number | null {
  let inside = 0;
  let all = 0;
  for (const [i, value] of surprise.entries()) {
    const error = forecast_se[i] ?? null;
    if (value === null || error === null) continue;
    all += 1;
    if (Math.abs(value) <= error) inside += 1;
  }
  return all === 0 ? null : inside / all;
}
