/** Travels with every figure that is handed out as data. */
export const DATA_CAUTION =
  'Figures are implied by a model. They are not official statistics, not measurements of output, ' +
  'not forecasts and not investment advice. They depend on stated assumptions and are subject to revision.';
