/** Stands on every image and beside every gap. */
export const shortCaution = 'Model-implied: not a measurement of output, not a forecast.';

/** Stands in every footer. */
export const longCaution =
  'Figures are implied by a model. They are not official statistics, not measurements of output, ' +
  'not forecasts and not investment advice. They depend on stated assumptions and are subject to revision.';
