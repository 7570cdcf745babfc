export { DATA_CAUTION as longCaution } from '../../lib/services/series/cautions.ts';

/** Stands on every image and beside every gap. */
export const shortCaution = 'Model-implied: not a measurement of output, not a forecast.';
