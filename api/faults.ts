import type { Context } from 'hono';
import type { z } from 'zod';
import { badRequest, type Fault } from './problems.ts';

type Outcome = { success: true } | { success: false; error: z.core.$ZodError };

/** Turns what a route's schema found wrong with the address into a problem that names each parameter. */
export function refuseFaulty(outcome: Outcome, c: Pick<Context, 'req'>): void {
  if (outcome.success) return;
  const given = c.req.queries();
  throw badRequest(outcome.error.issues.flatMap((issue) => faultsOf(issue, given)));
}

function faultsOf(issue: z.core.$ZodIssue, given: Record<string, string[]>): Fault[] {
  if (issue.code === 'unrecognized_keys') {
    return issue.keys.map((parameter) => ({
      parameter,
      message: `There is no parameter "${parameter}" here.`,
    }));
  }
  const parameter = issue.path.map(String).join('.');
  // An issue does not carry its input, and its own words would speak of arrays.
  const isRepeated = (given[parameter]?.length ?? 0) > 1;
  const message = isRepeated
    ? `${parameter} may be given once.`
    : issue.message.startsWith(parameter)
      ? issue.message
      : `${parameter}: ${issue.message}`;
  return [{ parameter, message }];
}
