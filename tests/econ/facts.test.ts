import { describe, expect, test } from 'vitest';
import { facts } from '../../src/lib/econ/facts.ts';
import { periodsFrom } from '../../src/lib/econ/periods.ts';
import type { ComputeResult, Values } from '../../src/lib/econ/types.ts';

/** A result of which only what facts read is filled in. */
function resultOf(surprise: number[], parts: Partial<ComputeResult> = {}): ComputeResult {
  return {
    periods: periodsFrom('2030-01', surprise.length, 'monthly'),
    surprise,
    forecast_se: surprise.map(() => 1),
    gap: null,
    gap_lower: null,
    gap_upper: null,
    diagnostics: { neutrality: null },
    ...parts,
  } as unknown as ComputeResult;
}

describe('facts', () => {
  test('name the last period that was at least as large on the same side', () => {
    const { surprise } = facts(resultOf([0.9, -3, 0.5, 0.2, 0.8]));
    expect(surprise.largest_since).toEqual({ period: '2030-01', value: 0.9, from: '2030-01' });
    const negative = facts(resultOf([0.9, 3, -0.5, 0.2, -0.8])).surprise;
    expect(negative.largest_since).toEqual({ period: null, value: null, from: '2030-01' });
    expect(negative.side).toBe('below');
  });

  test('rank within the last ten years only', () => {
    const history = [9, ...Array.from({ length: 119 }, (_, i) => i / 1000)];
    const { rank } = facts(resultOf([...history, 0.1])).surprise;
    expect(rank).toEqual({ from_top: 19, by_size: 19, of: 120, from: '2030-02', to: '2040-01' });
  });

  test('count the run on one side and the change', () => {
    const { surprise } = facts(resultOf([1, -1, 0.25, 0.5, 0.75]));
    expect(surprise.run).toEqual({ periods: 3, from: '2030-03', to: '2030-05' });
    expect(surprise.change).toEqual({ period: '2030-04', before: 0.5, value: 0.25 });
    expect(facts(resultOf([1, 0])).surprise).toMatchObject({
      side: 'level',
      run: null,
      largest_since: null,
    });
    expect(facts(resultOf([1])).surprise.change).toBeNull();
  });

  test('state the share inside the typical range of each month', () => {
    const errors: Values = [null, 1, 1, 2, 0.5];
    expect(
      facts(resultOf([1, 1.5, 0.5, 1.5, -0.6], { forecast_se: errors })).typical_range,
    ).toEqual({
      inside: 2,
      of: 4,
      share: 0.5,
      from: '2030-02',
      to: '2030-05',
      latest_inside: false,
    });
  });

  test('say whether the band leaves out zero, and whether the gap is an assumption', () => {
    const gap = { gap: [null, 0.3], gap_lower: [null, 0.1], gap_upper: [null, 0.5] };
    const rejected = {
      diagnostics: { neutrality: { p: 0.001 } },
    } as unknown as Partial<ComputeResult>;
    const found = facts(resultOf([1, 1], { ...gap, ...rejected }));
    expect(found.band).toEqual({ lower: 0.1, upper: 0.5, leaves_out_zero: true });
    expect(found.gap).toMatchObject({ value: 0.3, change: null, side: 'above' });
    expect(found.neutrality_rejected).toBe(true);
    expect(facts(resultOf([1, 1])).neutrality_rejected).toBeNull();
  });

  test('hold figures of earlier releases against this history', () => {
    const history = [
      { period: '2030-01', surprise: 0.75, gap: 0.2 },
      { period: '2029-12', surprise: 1 },
    ];
    expect(facts(resultOf([0.5, 1]), history).revised).toEqual([
      { period: '2030-01', indicator: 'surprise', before: 0.75, now: 0.5, change: -0.25 },
    ]);
  });
});
