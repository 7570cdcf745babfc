import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { periodsFrom } from '../../src/lib/econ/periods.ts';
import { race, raceOf, type RaceResult } from '../../src/lib/econ/race.ts';
import { revisions } from '../../src/lib/econ/revisions.ts';
import type { ComputeRequest, Expectation } from '../../src/lib/econ/types.ts';
import { compare } from './agreement.ts';
import { dataset } from './published.ts';

// Values and their sources: tests/reference/race-and-revisions.json.
const reference = JSON.parse(
  readFileSync(new URL('../reference/race-and-revisions.json', import.meta.url), 'utf8'),
) as {
  races: {
    dataset: string;
    rules: Record<string, Expectation> & { random_walk: Expectation };
    first: string;
    last: string;
    periods: number;
    result: RaceResult['rules'];
  }[];
  revisions: { published_values: Record<string, number[]>; result: object };
};

const disagreements = (got: unknown, expected: unknown) =>
  compare(got, expected).filter((one) => !one.agrees);

describe('the forecast race', () => {
  test.each(reference.races)('agrees with the reference on $dataset', (one) => {
    const annual = dataset(one.dataset);
    const monthly = one.dataset.endsWith('monthly');
    const survey = monthly ? surveyOf(one.dataset) : undefined;
    const result = raceOf(
      {
        frequency: monthly ? 'monthly' : 'quarterly',
        money: { start: monthly ? '1995-01' : '1950-Q1', values: Array.from(annual.money!) },
        surveyed_growth: survey,
      },
      one.rules,
    );
    expect([result.first, result.last, result.periods]).toEqual([one.first, one.last, one.periods]);
    expect(disagreements(result.rules, one.result)).toEqual([]);
  });

  test('of a request runs the rule in force beside three others', () => {
    const { money } = dataset('us-greene-quarterly');
    const request: ComputeRequest = {
      frequency: 'quarterly',
      money: { start: '1950-Q1', values: Array.from(money!) },
      expectation: { rule: 'autoregression', order: 1, window: { kind: 'rolling', length: 40 } },
      slope: { method: 'fixed', b: 0.5 },
    };
    const { rules } = race(request);
    expect(Object.keys(rules)).toEqual(['random_walk', 'ar1', 'adaptive', 'in_force']);
    expect(rules.in_force).toEqual(rules.ar1);
    const walk = race({
      ...request,
      expectation: { rule: 'random_walk', window: { kind: 'rolling', length: 40 } },
    });
    expect(walk.rules.in_force!.diebold_mariano).toBeNull();
  });
});

test('revision statistics agree with the reference', () => {
  const { published_values: values, result } = reference.revisions;
  expect(disagreements(revisions(values), result)).toEqual([]);
  expect(revisions(values).periods[0]).toMatchObject({
    period: '2001-01',
    first: 1.2,
    latest: 0.7,
  });
});

test('revision statistics of too few values are null', () => {
  expect(revisions({}).mean_revision).toBeNull();
  expect(revisions({ '2001-01': [0, 1] })).toMatchObject({
    mean_revision: 1,
    sd_revision: null,
    share_of_sign_changes: 1,
    noise_to_signal: null,
  });
});

function surveyOf(name: string) {
  const text = readFileSync(
    new URL(`../reference/datasets/${name}-survey.csv`, import.meta.url),
    'utf8',
  );
  const rows = text
    .trim()
    .split('\n')
    .slice(1)
    .map((line) => line.trim().split(','));
  expect(rows.map((row) => row[0])).toEqual(periodsFrom(rows[0]![0]!, rows.length, 'monthly'));
  return { start: rows[0]![0]!, values: rows.map((row) => Number(row[1])) };
}
