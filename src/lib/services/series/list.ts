import type { Db } from '../../../../db/connection.ts';
import type { Frequency, Timing } from '../../econ/types.ts';
import { type EconomyStanding, listEconomies } from '../economies/public.ts';
import type { View } from '../view.ts';
import { DERIVED_CONCEPTS, type DerivedConcept, type InputConcept, seriesId } from './concepts.ts';
import {
  type DatedExtent,
  type Extent,
  firstExtents,
  latestExtents,
  servedVintages,
} from './extents.ts';

/** A series as readers find it in the catalogue. */
export interface SeriesInfo {
  id: string;
  economyCode: string;
  economyName: string;
  concept: string;
  title: string;
  unit: string;
  frequency: Frequency;
  /** Where its values come from: a file of the desk, or a release's computation. */
  origin:
    | { kind: 'input'; concept: InputConcept; servesValues: boolean }
    | { kind: 'derived'; derived: DerivedConcept };
  adjustment: 'adjusted' | 'unadjusted';
  timing: Timing | null;
  source: string;
  licence: string;
  /** First and last period with a value; null while there is none. */
  firstPeriod: string | null;
  lastPeriod: string | null;
  /** When its newest values became public, and with which release. */
  lastUpdated: Date | null;
  releaseId: string | null;
}

export interface SeriesFilter {
  economy?: string;
  concept?: string;
  /** Words that id, title, concept, economy or source must contain, in any case. */
  q?: string;
}

/** The licence of what we publish ourselves. */
const OWN_LICENCE = 'CC BY 4.0';

/** The series that are public in a view, by economy's name and in the order of concepts. */
export async function listSeries(
  db: Db,
  view: View,
  filter: SeriesFilter = {},
): Promise<SeriesInfo[]> {
  const all = await listEconomies(db, view);
  const economies = all.filter(({ economy }) => !filter.economy || economy.code === filter.economy);
  const codes = economies.map(({ economy }) => economy.code);
  const newest = economies.flatMap(({ latest }) => (latest ? [latest.id] : []));
  const [latestOf, firstOf, vintageOf] = await Promise.all([
    latestExtents(db, newest),
    firstExtents(db, view, codes),
    servedVintages(db, view, codes),
  ]);
  const words = (filter.q ?? '').toLowerCase().split(/\s+/).filter(Boolean);
  return economies
    .flatMap((standing) => [
      ...inputsOf(standing, vintageOf),
      ...derivedOf(standing, (derived) =>
        derived.history === 'first'
          ? firstOf.get(`${standing.economy.code} ${derived.indicator}`)
          : dated(standing.latest, latestOf, derived),
      ),
    ])
    .filter((series) => !filter.concept || series.concept === filter.concept)
    .filter((series) => {
      const text =
        `${series.id} ${series.title} ${series.concept} ${series.economyName} ${series.source}`.toLowerCase();
      return words.every((word) => text.includes(word));
    });
}

function dated(
  latest: EconomyStanding['latest'],
  extents: Map<string, Extent>,
  { indicator, column }: DerivedConcept,
): DatedExtent | undefined {
  const extent = latest && extents.get(`${latest.id} ${indicator} ${column}`);
  return extent ? { ...extent, lastUpdated: latest.publishedAt, releaseId: latest.id } : undefined;
}

function inputsOf(standing: EconomyStanding, vintageOf: Map<string, DatedExtent>): SeriesInfo[] {
  const { economy, series } = standing;
  return series.map((row) => {
    const known = row.serve_values ? vintageOf.get(row.id) : undefined;
    return {
      ...common(standing, row.concept),
      id: row.id,
      title: row.title,
      unit: row.unit,
      origin: { kind: 'input', concept: row.concept, servesValues: row.serve_values },
      adjustment: row.adjustment,
      timing: row.timing,
      source: row.source,
      licence: row.licence,
      frequency: economy.frequency,
      ...extentOf(known),
    };
  });
}

/** A concept exists for an economy once a release has published its indicator. */
function derivedOf(
  standing: EconomyStanding,
  knownOf: (derived: DerivedConcept) => DatedExtent | undefined,
): SeriesInfo[] {
  const money = standing.series.find((row) => row.concept === 'money');
  const { frequency } = standing.economy;
  return DERIVED_CONCEPTS.flatMap((derived) => {
    const known = knownOf(derived);
    if (!known) return [];
    return {
      ...common(standing, derived.concept),
      title: derived.title,
      unit: derived.unit(frequency),
      origin: { kind: 'derived' as const, derived },
      adjustment: money?.adjustment ?? 'unadjusted',
      timing: money?.timing ?? null,
      source: `Slackwater, from ${money?.source ?? 'published data'}`,
      licence: OWN_LICENCE,
      ...extentOf(known),
    };
  });
}

function common({ economy }: EconomyStanding, concept: string) {
  return {
    id: seriesId(economy.code, concept, economy.frequency),
    economyCode: economy.code,
    economyName: economy.name,
    concept,
    frequency: economy.frequency,
  };
}

function extentOf(known: DatedExtent | undefined) {
  return {
    firstPeriod: known?.firstPeriod ?? null,
    lastPeriod: known?.lastPeriod ?? null,
    lastUpdated: known?.lastUpdated ?? null,
    releaseId: known?.releaseId ?? null,
  };
}
