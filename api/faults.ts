import type { z } from 'zod';
import { badRequest, type Fault } from './problems.ts';

type Outcome = { success: true } | { success: false; error: z.core.$ZodError };

/** Turns what a route's schema found wrong with the address into a problem that names each parameter. */
export function refuseFaulty(outcome: Outcome): void {
  if (!outcome.success) throw badRequest(outcome.error.issues.flatMap(faultsOf));
}

function faultsOf(issue: z.core.$ZodIssue): Fault[] {
  if (issue.code === 'unrecognized_keys') {
    return issue.keys.map((parameter) => ({
      parameter,
      message: `There is no parameter "${parameter}" here.`,
    }));
  }
  const parameter = issue.path.map(String).join('.');
  const isRepeated = issue.code === 'invalid_type' && Array.isArray(issue.input);
  const message = isRepeated
    ? `${parameter} may be given once.`
    : issue.message.startsWith(parameter)
      ? issue.message
      : `${parameter}: ${issue.message}`;
  return [{ parameter, message }];
}
