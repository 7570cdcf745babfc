/**
 * The instant a reader looks from. Every public reading service takes one, so that the page of a coming
 * moment is drawn by the same queries that answer now.
 */
export interface View {
  at: Date;
  /**
   * Set while a coming moment is drawn, to the instant of drawing: releases scheduled after it and up to `at` count
   * although they are not ready yet. One that missed its own second does not.
   */
  rehearsedAt?: Date;
  /** A release that counts as published at `at` whatever its state: the desk's preview. */
  include?: string;
}
