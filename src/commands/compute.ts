import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { compute } from '../lib/econ/compute.ts';
import { problem, RefusedError } from '../lib/econ/refusal.ts';
import type { ComputeRequest } from '../lib/econ/types.ts';

/** What the command prints, and the status it exits with. */
export interface Answer {
  status: 0 | 1 | 2;
  out?: string;
  error?: string;
}

/**
 * `npm run --silent compute -- request.json` (or `-` for standard input): the result as JSON on standard output.
 * A refused request prints its problem document on standard error and exits 2; anything unreadable exits 1.
 * A reference case, which carries its request under `request`, is computed by that.
 * @param args What follows the command's name. @param read Reads a file, or standard input for 0.
 */
export function answer(args: readonly string[], read: (file: string | 0) => string): Answer {
  const [file, ...more] = args;
  if (file === undefined || more.length > 0) {
    return unread(
      'Say which request to compute: npm run --silent compute -- request.json (or - for standard input).',
    );
  }
  const name = file === '-' ? 'Standard input' : file;
  let text: string;
  try {
    text = read(file === '-' ? 0 : file);
  } catch (error) {
    return unread(unreadable(name, error));
  }
  if (text.trim() === '') return unread(`${name} is empty: it should hold a request as JSON.`);
  let input: unknown;
  try {
    input = JSON.parse(text);
  } catch (error) {
    return unread(`${name} is not valid JSON: ${reason(error)}.`);
  }
  try {
    return { status: 0, out: JSON.stringify(compute(requestOf(input))) };
  } catch (error) {
    if (!(error instanceof RefusedError)) throw error;
    return { status: 2, error: JSON.stringify(problem(error), null, 2) };
  }
}

function requestOf(input: unknown): ComputeRequest {
  const isCase =
    typeof input === 'object' && input !== null && 'request' in input && 'expected' in input;
  return (isCase ? input.request : input) as ComputeRequest;
}

function unreadable(name: string, error: unknown): string {
  const code = (error as NodeJS.ErrnoException).code;
  if (code === 'ENOENT') return `There is no file ${name}.`;
  if (code === 'EISDIR') return `${name} is a folder; name the file that holds the request.`;
  if (code === 'EACCES') return `${name} may not be read by this user.`;
  return `${name} cannot be read: ${reason(error)}`;
}

function unread(error: string): Answer {
  return { status: 1, error };
}

function reason(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const { status, out, error } = answer(process.argv.slice(2), (file) =>
    readFileSync(file, 'utf8'),
  );
  if (out !== undefined) process.stdout.write(`${out}\n`);
  if (error !== undefined) process.stderr.write(`${error}\n`);
  process.exitCode = status;
}
