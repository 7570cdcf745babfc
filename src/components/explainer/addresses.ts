import { PERIODS_A_YEAR } from '../../lib/econ/periods.ts';
import type { Frequency } from '../../lib/econ/types.ts';
import {
  releaseFile as fileOfRelease,
  seriesFile as fileOfSeries,
} from '../../lib/publication/plan.ts';
import { seriesId } from '../../lib/services/series/concepts.ts';

interface Addressed {
  id: string;
  economyCode: string;
  period: string;
  revision: number;
}

/** Where the month's standing explainer is. */
export const releaseAddress = ({
  economyCode,
  period,
}: Pick<Addressed, 'economyCode' | 'period'>) => `/releases/${economyCode}/${period}/`;

/** Where this revision stays. */
export const revisionAddress = (release: Pick<Addressed, 'economyCode' | 'period' | 'revision'>) =>
  `${releaseAddress(release)}r${release.revision}/`;

/** The wide image of the surprise of this revision: never changes. */
export const pinnedImage = (release: Addressed, type: 'png' | 'svg') =>
  `/images/${release.economyCode}/${release.period}/r${release.revision}/surprise-wide.${type}`;

/** The same by month: follows corrections. */
export const monthImage = (release: Pick<Addressed, 'economyCode' | 'period'>) =>
  `/images/${release.economyCode}/${release.period}/surprise-wide.png`;

/** A file frozen with the release. */
export const releaseFile = ({ id }: Pick<Addressed, 'id'>, name: string) => fileOfRelease(id, name);

/** The latest published values of a series. */
export const seriesFile = (code: string, concept: string, frequency: Frequency) =>
  fileOfSeries(seriesId(code, concept, frequency));

/** How many periods make the "two years" that tables and small bars show: two years, or all of a short annual history. */
export const twoYears = (frequency: Frequency) => Math.max(2 * PERIODS_A_YEAR[frequency], 8);
