import type { Runtime } from '../../lib/runtime.ts';
import { type Announced, upcoming } from '../../lib/services/calendar/upcoming.ts';
import { type EconomyStanding, listEconomies } from '../../lib/services/economies/public.ts';
import {
  type PublicRelease,
  type ReleaseSummary,
  latestRelease,
  listReleases,
} from '../../lib/services/releases/public.ts';
import type { View } from '../../lib/services/view.ts';
import { type Reading, readingOf } from '../words/reading.ts';

/** One economy on the home page: its latest release, and whether that is of the month shown. */
export interface Column {
  standing: EconomyStanding;
  release: PublicRelease | null;
  /** The reading of the latest release. */
  reading: Reading | null;
  isOut: boolean;
  /** When the month shown is due, where it is announced and not out. */
  due: Announced | null;
}

export interface HomeData {
  /** The newest month that has any release; null where none has. */
  month: string | null;
  /** Monthly economies: those that are out first. */
  columns: Column[];
  /** Quarterly and annual economies. */
  others: Column[];
  explainers: ReleaseSummary[];
  next: Announced[];
}

/** What the home page shows at the view's instant. */
export async function loadHome({ db }: Pick<Runtime, 'db'>, view: View): Promise<HomeData> {
  const [standings, explainers, announced] = await Promise.all([
    listEconomies(db, view),
    listReleases(db, view, { limit: 12 }),
    upcoming(db, view),
  ]);
  const releases = await Promise.all(
    standings.map(({ economy }) => latestRelease(db, view, economy.code)),
  );
  const monthly = releases.filter((release) => release?.frequency === 'monthly');
  const month = monthly.map((release) => release!.period).reduce(later, null);
  const columns = standings.map((standing, i): Column => {
    const release = releases[i] ?? null;
    return {
      standing,
      release,
      reading: release && readingOf(release),
      isOut: release !== null && release.period === month,
      due:
        announced.find(
          ({ economyCode, period }) => economyCode === standing.economy.code && period === month,
        ) ?? null,
    };
  });
  return {
    month,
    columns: columns.filter(({ standing }) => standing.economy.frequency === 'monthly'),
    others: columns.filter(
      ({ standing, release }) => standing.economy.frequency !== 'monthly' && release,
    ),
    explainers,
    next: announced,
  };
}

function later(a: string | null, b: string): string {
  return a === null || b > a ? b : a;
}
