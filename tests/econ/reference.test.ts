import { readdirSync, readFileSync } from 'node:fs';
import { afterAll, describe, expect, test } from 'vitest';
import { compute } from '../../src/lib/econ/compute.ts';
import { problem, RefusedError } from '../../src/lib/econ/refusal.ts';
import type { ComputeRequest, ComputeResult, Fault } from '../../src/lib/econ/types.ts';
import { compare, type Comparison } from './agreement.ts';

// Expected values and where each comes from: tests/reference/SOURCES.md.
const folder = new URL('../reference/cases/', import.meta.url);

interface Case {
  name: string;
  request: ComputeRequest;
  expected: ComputeResult | { status: number; errors: Partial<Fault>[] };
  also_accepted?: string[];
  expect_warning?: boolean;
}

const cases = readdirSync(folder)
  .filter((file) => file.endsWith('.json'))
  .map((file) => JSON.parse(readFileSync(new URL(file, folder), 'utf8')) as Case);
const computations = cases.filter((one) => !('errors' in one.expected));
const refusals = cases.filter((one) => 'errors' in one.expected);

const worst = new Map<string, number>();

describe('computed cases agree with the reference, field by field', () => {
  test.each(computations)('$name', (one) => {
    const result = compute(one.request);
    const comparisons = compare(result, one.expected);
    for (const { field, deviation } of comparisons) {
      worst.set(field, Math.max(worst.get(field) ?? 0, deviation));
    }
    expect(comparisons.filter((comparison) => !comparison.agrees).map(short)).toEqual([]);
    if (one.expect_warning) expect(result.warnings.length).toBeGreaterThan(0);
  });

  afterAll(() => {
    if (!process.env.SHOW_DEVIATIONS) return;
    for (const [field, deviation] of worst) console.log(deviation.toExponential(1), field);
  });
});

describe('refused cases are refused at the pointer and period', () => {
  test.each(refusals)('$name', (one) => {
    const { errors } = one.expected as { errors: Fault[] };
    const document = refusalOf(one.request);
    expect(document.status).toBe(422);
    for (const expected of errors) {
      const pointers = [expected.pointer, ...(one.also_accepted ?? [])];
      const found = document.errors.find(
        (fault) =>
          pointers.includes(fault.pointer) &&
          (expected.period === undefined || fault.period === expected.period),
      );
      expect(found, JSON.stringify(document.errors)).toBeDefined();
    }
  });
});

function refusalOf(request: ComputeRequest) {
  try {
    compute(request);
  } catch (error) {
    if (error instanceof RefusedError) return problem(error);
    throw error;
  }
  throw new Error('The request was computed.');
}

function short({ field, deviation, got, expected }: Comparison) {
  return {
    field,
    deviation,
    got: JSON.stringify(got)?.slice(0, 200),
    expected: JSON.stringify(expected).slice(0, 200),
  };
}
