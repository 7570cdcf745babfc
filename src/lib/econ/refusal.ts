import type { Fault } from './types.ts';

/** A request that cannot be computed, with every fault that was found. */
export class RefusedError extends Error {
  readonly faults: Fault[];

  constructor(faults: Fault[]) {
    super(faults.map((fault) => fault.message).join(' '));
    this.name = 'RefusedError';
    this.faults = faults;
  }
}

/** An RFC 9457 problem document. */
export interface Problem {
  type: string;
  title: string;
  status: 422;
  detail: string;
  errors: Fault[];
}

/** The problem document of a refused request (the contract's Refusals). */
export function problem(error: RefusedError): Problem {
  const { faults } = error;
  const detail =
    faults.length === 1
      ? faults[0]!.message
      : `${faults.length} things in the request need changing; each is listed under errors.`;
  return {
    type: 'urn:slackwater:problem:refused-request',
    title: 'The request is refused',
    status: 422,
    detail,
    errors: faults,
  };
}

/** Joins names and indices into an RFC 6901 pointer, with `~` and `/` escaped. */
export function pointer(...tokens: (string | number)[]): string {
  return tokens
    .map((token) => `/${String(token).replaceAll('~', '~0').replaceAll('/', '~1')}`)
    .join('');
}
