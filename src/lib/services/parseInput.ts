import type { z } from 'zod';
import { ServiceError } from './context.ts';

/** What the schema makes of the input. @throws ServiceError `invalid` with one fault a field. */
export function parseInput<T extends z.ZodType>(schema: T, input: unknown): z.output<T> {
  const parsed = schema.safeParse(input);
  if (parsed.success) return parsed.data;
  const faults = parsed.error.issues.map((issue) => ({
    field: issue.path.join('.'),
    message: issue.message,
  }));
  throw new ServiceError('invalid', 'Some fields need another look.', faults);
}
