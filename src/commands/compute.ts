import { readFileSync } from 'node:fs';
import { compute } from '../lib/econ/compute.ts';
import { problem, RefusedError } from '../lib/econ/refusal.ts';
import type { ComputeRequest } from '../lib/econ/types.ts';

/**
 * `npm run --silent compute -- request.json` (or `-` for standard input): the result as JSON on standard output.
 * A refused request prints its problem document on standard error and exits 2; anything unreadable exits 1.
 * A reference case, which carries its request under `request`, is computed by that.
 */
function main(): number {
  const [file, ...more] = process.argv.slice(2);
  if (file === undefined || more.length > 0) {
    return fail(
      'Say which request to compute: npm run --silent compute -- request.json (or - for standard input).',
    );
  }
  const name = file === '-' ? 'standard input' : file;
  let text: string;
  try {
    text = readFileSync(file === '-' ? 0 : file, 'utf8');
  } catch (error) {
    return fail(`${name} cannot be read: ${reason(error)}`);
  }
  let input: unknown;
  try {
    input = JSON.parse(text);
  } catch (error) {
    return fail(`${name} is not valid JSON: ${reason(error)}`);
  }
  try {
    process.stdout.write(`${JSON.stringify(compute(requestOf(input)))}\n`);
    return 0;
  } catch (error) {
    if (!(error instanceof RefusedError)) throw error;
    process.stderr.write(`${JSON.stringify(problem(error), null, 2)}\n`);
    return 2;
  }
}

function requestOf(input: unknown): ComputeRequest {
  const isCase =
    typeof input === 'object' && input !== null && 'request' in input && 'expected' in input;
  return (isCase ? input.request : input) as ComputeRequest;
}

function fail(message: string): number {
  process.stderr.write(`${message}\n`);
  return 1;
}

function reason(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}

process.exitCode = main();
