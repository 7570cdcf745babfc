import { pointer } from '../refusal.ts';
import type { Fault } from '../types.ts';

/** Path from the request's root to a value. */
export type Path = readonly (string | number)[];

/** A JSON object of unknown content. */
export type Fields = Readonly<Record<string, unknown>>;

/** Reads parts of an unknown request and keeps every fault it meets, so that all are told at once. */
export class Reader {
  readonly faults: Fault[] = [];

  /** Records a fault at `path`; returns undefined, so that a reading function can return it as "no value". */
  fault(path: Path, message: string, period?: string): undefined {
    const at = pointer(...path);
    this.faults.push(
      period === undefined ? { pointer: at, message } : { pointer: at, period, message },
    );
  }

  /** An object, or a fault that says what `what` should be. */
  object(value: unknown, path: Path, what: string): Fields | undefined {
    if (typeof value === 'object' && value !== null && !Array.isArray(value))
      return value as Fields;
    return this.fault(path, `${what} must be an object with named fields, not ${shown(value)}.`);
  }

  /** A fault for each field that is not among `known`; `unused` says why a field known elsewhere has no place here. */
  only(
    fields: Fields,
    path: Path,
    known: readonly string[],
    unused: Record<string, string> = {},
  ): void {
    for (const name of Object.keys(fields)) {
      if (known.includes(name)) continue;
      const reason = Object.hasOwn(unused, name) ? unused[name] : undefined;
      this.fault(
        [...path, name],
        reason ?? `There is no field called "${name}" here. The fields are ${list(known)}.`,
      );
    }
  }

  /** A number within bounds, described by `bounds` in words. */
  number(
    value: unknown,
    path: Path,
    what: string,
    bounds: string,
    within: (value: number) => boolean,
  ): number | undefined {
    if (typeof value === 'number' && Number.isFinite(value) && within(value)) return value;
    return this.fault(path, `${what} must be ${bounds}, not ${shown(value)}.`);
  }

  /** A whole number from `least` to `most`. */
  integer(
    value: unknown,
    path: Path,
    what: string,
    least: number,
    most = Infinity,
  ): number | undefined {
    const bounds =
      most === Infinity
        ? `a whole number of at least ${least}`
        : `a whole number from ${least} to ${most}`;
    const within = (number: number) =>
      Number.isInteger(number) && number >= least && number <= most;
    return this.number(value, path, what, bounds, within);
  }

  /** One of a few texts. */
  choice<T extends string>(
    value: unknown,
    path: Path,
    what: string,
    choices: readonly T[],
  ): T | undefined {
    if (choices.includes(value as T)) return value as T;
    return this.fault(
      path,
      `${what} must be ${list(
        choices.map((text) => `"${text}"`),
        'or',
      )}, not ${shown(value)}.`,
    );
  }
}

/** A value as a message shows it, shortened. */
export function shown(value: unknown): string {
  if (value === undefined) return 'missing';
  if (typeof value === 'string')
    return value.length > 40 ? `"${value.slice(0, 40)}…"` : `"${value}"`;
  if (typeof value === 'number' || typeof value === 'boolean' || value === null)
    return String(value);
  return Array.isArray(value)
    ? 'a list'
    : typeof value === 'object'
      ? 'an object'
      : 'something else';
}

function list(words: readonly string[], last = 'and'): string {
  if (words.length < 2) return words.join('');
  return `${words.slice(0, -1).join(', ')} ${last} ${words[words.length - 1]}`;
}
