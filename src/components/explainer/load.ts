import type { Runtime } from '../../lib/runtime.ts';
import { type Announced, upcoming } from '../../lib/services/calendar/upcoming.ts';
import { type EconomyStanding, getEconomy } from '../../lib/services/economies/public.ts';
import {
  type PublicRelease,
  firstPublished,
  getRelease,
  listReleases,
  listRevisions,
} from '../../lib/services/releases/public.ts';
import type { View } from '../../lib/services/view.ts';
import { addPeriods, comparePeriods, frequencyOf } from '../../lib/econ/periods.ts';

/** Everything an explainer's page shows besides the release itself. */
export interface ExplainerData {
  release: PublicRelease;
  economy: EconomyStanding | null;
  revisions: { id: string; revision: number; publishedAt: Date }[];
  /** The release whose history this one is compared with: the revision before, or the standing one of the period before. */
  before: PublicRelease | null;
  first: { period: string; value: number | null }[];
  next: Announced | null;
  /** The neighbouring periods that have a standing release. */
  earlier: { period: string; headline: string } | null;
  later: { period: string; headline: string } | null;
}

/** What an address of a release shows; null where nothing public is there. */
export async function loadExplainer(
  { db }: Pick<Runtime, 'db'>,
  view: View,
  which: { economy: string; period: string; revision?: number },
): Promise<ExplainerData | null> {
  if (frequencyOf(which.period) === null) return null;
  const release = await getRelease(db, view, which);
  if (!release) return null;
  const { economyCode: economy, period } = release;
  const [standing, revisions, before, first, announced, releases] = await Promise.all([
    getEconomy(db, view, economy),
    listRevisions(db, view, { economy, period }),
    getRelease(db, view, comparedWith(release)),
    firstPublished(db, view, { economy, indicator: 'money_surprise' }),
    upcoming(db, view, economy),
    listReleases(db, view, { economy }),
  ]);
  const ordered = [...releases].sort((a, b) => comparePeriods(a.period, b.period));
  return {
    release,
    economy: standing,
    revisions,
    before,
    first,
    next: announced[0] ?? null,
    earlier: ordered.filter((one) => comparePeriods(one.period, period) < 0).at(-1) ?? null,
    later: ordered.find((one) => comparePeriods(one.period, period) > 0) ?? null,
  };
}

function comparedWith({ economyCode, period, revision }: PublicRelease) {
  return revision > 1
    ? { economy: economyCode, period, revision: revision - 1 }
    : { economy: economyCode, period: addPeriods(period, -1) };
}
