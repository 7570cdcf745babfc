import { ServiceError } from '../../lib/services/context.ts';
import { VintageFileError } from '../../lib/services/vintages/faults.ts';

/** Why a form was not accepted, for the page that shows it again. */
export interface Trouble {
  status: number;
  kind: ServiceError['kind'];
  message: string;
  faults: { field: string; message: string }[];
  /** Where it is a data file: each fault with its place. */
  file: { faults: VintageFileError['fileFaults']; count: number } | null;
}

const STATUS: Record<ServiceError['kind'], number> = {
  forbidden: 403,
  not_found: 404,
  conflict: 409,
  too_large: 413,
  invalid: 422,
};

export type Outcome<T> = { value: T; trouble: null } | { value: null; trouble: Trouble };

/** Calls a verb; what it refuses is told to the person, anything else is an error of ours. */
export async function attempt<T>(verb: () => Promise<T>): Promise<Outcome<T>> {
  try {
    return { value: await verb(), trouble: null };
  } catch (error) {
    if (!(error instanceof ServiceError)) throw error;
    return { value: null, trouble: troubleOf(error) };
  }
}

function troubleOf(error: ServiceError): Trouble {
  const { kind, message, faults } = error;
  const file =
    error instanceof VintageFileError ? { faults: error.fileFaults, count: error.count } : null;
  return { status: STATUS[kind], kind, message, faults, file };
}

/** Trouble that a page finds itself, before it calls a verb. */
export function troubleWith(field: string, message: string): Trouble {
  return {
    status: 422,
    kind: 'invalid',
    message: 'Some fields need another look.',
    faults: [{ field, message }],
    file: null,
  };
}

/** The message at a field, if it has one. */
export function faultAt(trouble: Trouble | null, field: string): string | undefined {
  return trouble?.faults.find((fault) => fault.field === field)?.message;
}

/** The id of a field's input, which the summary of errors links to. */
export function inputId(field: string): string {
  return `field-${field.replace(/[^A-Za-z0-9]+/g, '-')}`;
}
