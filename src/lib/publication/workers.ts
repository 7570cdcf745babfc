import type { ComputeRequest, ComputeResult } from '../econ/types.ts';
import type { Facts, ReleasedFigure } from '../econ/facts.ts';
import type { RaceResult } from '../econ/race.ts';
import type { ShareImage, ShareImageInput } from '../images/shareImage.ts';
import type { View } from '../services/view.ts';

/** A page as the site would answer it at the view's instant. */
export interface RenderedPage {
  status: number;
  headers: Record<string, string>;
  body: Uint8Array;
}

/** What is computed from a release's request and result besides. */
export interface Examined {
  facts: Facts;
  race: RaceResult | null;
}

/** So many computations wait that another would not be done soon: try again in a moment. */
export class BusyError extends Error {
  override name = 'BusyError';
  constructor() {
    super('The computation is busy. Try again in a moment.');
  }
}

/** The heavy work, kept off the serving loop: in the process a pool of threads, in tests whatever answers the same. */
export interface Workers {
  /** Renders the page of an address with the built site; the same bytes as a request for it in that view. */
  page(address: string, view: View): Promise<RenderedPage>;
  /** Draws the share image of a release's surprise. */
  shareImage(input: ShareImageInput): Promise<ShareImage>;
  /** The contract's computation; throws econ's `RefusedError`, or `BusyError`. */
  compute(request: ComputeRequest): Promise<ComputeResult>;
  /** What the numbers allow a writer to say, and the forecast race; no race where the series are too short for one. */
  examine(
    request: ComputeRequest,
    result: ComputeResult,
    released: ReleasedFigure[],
  ): Promise<Examined>;
  /** Brotli (quality 5) and gzip forms of the bytes. */
  compress(bytes: Uint8Array): Promise<{ br: Uint8Array; gzip: Uint8Array }>;
  close(): Promise<void>;
}
