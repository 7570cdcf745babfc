import type { EconomyStanding } from '../../lib/services/economies/public.ts';

/** A series that an economy's releases are computed from, as readers see it. */
export type InputSeries = EconomyStanding['series'][number];
