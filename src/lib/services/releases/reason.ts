import { z } from 'zod';

/** A reason in words, which a verb demands. */
export const reasonField = z
  .string()
  .trim()
  .min(1, 'Say why.')
  .max(1000, 'Use at most 1,000 characters.');
