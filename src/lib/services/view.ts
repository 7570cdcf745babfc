/**
 * The instant a reader looks from. Every public reading service takes one, so that the page of a coming
 * moment is drawn by the same queries that answer now.
 */
export interface View {
  at: Date;
  /** Rendering a coming moment: releases scheduled up to `at` count although their moment is not ready yet. */
  rehearsal?: boolean;
  /** A release that counts as published at `at` whatever its state: the desk's preview. */
  include?: string;
}
