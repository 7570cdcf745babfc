/** Φ⁻¹(0.9): half an 80% interval in standard errors. */
export const standardNormal80 = 1.2815515655446004;
