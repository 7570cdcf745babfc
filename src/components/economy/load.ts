import { revisions, type RevisionStatistics } from '../../lib/econ/revisions.ts';
import type { Runtime } from '../../lib/runtime.ts';
import { type EconomyStanding, getEconomy } from '../../lib/services/economies/public.ts';
import {
  type PublicRelease,
  type ReleaseSummary,
  firstPublished,
  latestRelease,
  listReleases,
} from '../../lib/services/releases/public.ts';
import type { View } from '../../lib/services/view.ts';

export interface EconomyData {
  standing: EconomyStanding;
  release: PublicRelease | null;
  /** Newest first. */
  releases: ReleaseSummary[];
  /** Money surprise: first published against the latest history. */
  revised: RevisionStatistics;
}

/** What an economy's page shows; null where the code is unknown or nothing of it is public. */
export async function loadEconomy(
  { db }: Pick<Runtime, 'db'>,
  view: View,
  code: string,
): Promise<EconomyData | null> {
  const standing = await getEconomy(db, view, code);
  if (!standing) return null;
  const [release, releases, first] = await Promise.all([
    latestRelease(db, view, code),
    listReleases(db, view, { economy: code }),
    firstPublished(db, view, { economy: code, indicator: 'money_surprise' }),
  ]);
  const { periods = [], surprise = [] } = release?.result ?? {};
  const latest = new Map(periods.map((period, i) => [period, surprise[i]!]));
  const published = first.flatMap(({ period, value }) => {
    const now = latest.get(period);
    return value === null || now === undefined ? [] : [[period, [value, now]] as const];
  });
  return {
    standing,
    release,
    releases: [...releases].sort((a, b) => (a.period < b.period ? 1 : -1)),
    revised: revisions(Object.fromEntries(published)),
  };
}
