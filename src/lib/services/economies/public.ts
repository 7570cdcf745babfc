import type { Db } from '../../../../db/connection.ts';
import type { Economy, Series } from '../../../../db/tables.ts';
import { comparePeriods } from '../../econ/periods.ts';
import type { Assumptions } from '../../econ/types.ts';
import { type Announced, upcoming } from '../calendar/upcoming.ts';
import { type ReleaseSummary, listReleases } from '../releases/public.ts';
import type { View } from '../view.ts';

/** An economy as readers see it. */
export interface EconomyStanding {
  economy: Economy;
  /** Input series, money first. */
  series: Series[];
  /** The approved version that the next announced release, or else the latest, is computed under. */
  specification: {
    version: number;
    assumptions: Assumptions;
    reason: string;
    holdsFrom: string;
  } | null;
  latest: ReleaseSummary | null;
  next: Announced | null;
}

/** Economies with at least one announced or published release, by name. */
export async function listEconomies(db: Db, view: View): Promise<EconomyStanding[]> {
  const [economies, series, specifications, releases, announced] = await Promise.all([
    db.selectFrom('economy').selectAll().orderBy('name').execute(),
    db.selectFrom('series').selectAll().execute(),
    db
      .selectFrom('specification')
      .selectAll()
      .where('approved_at', '<=', view.at)
      .orderBy('economy_code')
      .orderBy('version', 'desc')
      .execute(),
    listReleases(db, view),
    upcoming(db, view),
  ]);
  const newest = new Map<string, ReleaseSummary>();
  for (const release of releases) {
    const known = newest.get(release.economyCode);
    if (!known || release.period > known.period) newest.set(release.economyCode, release);
  }
  return economies
    .map((economy) => {
      const latest = newest.get(economy.code) ?? null;
      const next = announced.find((row) => row.economyCode === economy.code) ?? null;
      const specification = inForce(
        specifications.filter((row) => row.economy_code === economy.code),
        next?.period ?? latest?.period,
      );
      return {
        economy,
        series: CONCEPTS.flatMap((concept) =>
          series.filter((row) => row.economy_code === economy.code && row.concept === concept),
        ),
        specification: specification
          ? {
              version: specification.version,
              assumptions: specification.assumptions as Assumptions,
              reason: specification.reason,
              holdsFrom: specification.holds_from,
            }
          : null,
        latest,
        next,
      };
    })
    .filter((standing) => standing.latest !== null || standing.next !== null);
}

/**
 * Of versions sorted newest first, the one a period is computed under. Where all of them begin later, the first
 * version: it is what the economy will begin with.
 */
function inForce<Version extends { holds_from: string }>(
  versions: Version[],
  period: string | undefined,
): Version | undefined {
  const holding = versions.find(
    ({ holds_from: from }) => period !== undefined && comparePeriods(from, period) <= 0,
  );
  return holding ?? versions.at(-1);
}

/** One economy as readers see it, or null where it is unknown or has nothing public yet. */
export async function getEconomy(
  db: Db,
  view: View,
  code: string,
): Promise<EconomyStanding | null> {
  const all = await listEconomies(db, view);
  return all.find((standing) => standing.economy.code === code) ?? null;
}

const CONCEPTS = ['money', 'prices', 'activity'] as const;
