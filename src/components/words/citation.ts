import { periodLabel } from '../../lib/charts/periodLabels.ts';
import { longDate } from './dates.ts';

export interface Cited {
  id: string;
  economyName: string;
  period: string;
  publishedAt: Date;
  /** Where this revision stays. */
  address: string;
  persistent: boolean;
}

/** How a release is cited: title, release, date, address. */
export function citation({
  id,
  economyName,
  period,
  publishedAt,
  address,
  persistent,
}: Cited): string {
  const year = publishedAt.getUTCFullYear();
  const what = persistent ? 'money surprise and implied output gap' : 'money surprise';
  return (
    `Slackwater (${year}), “${economyName}: ${what}, ${periodLabel(period)}”, ` +
    `release ${id}, ${longDate(publishedAt)}. Model-implied figures. ${address}`
  );
}
