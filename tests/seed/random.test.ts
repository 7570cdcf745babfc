import { describe, expect, test } from 'vitest';
import { randomStream, xoshiro } from '../../seed/random.ts';

describe('random numbers', () => {
  test('are those of the published generator', () => {
    // From xoshiro128starstar.c 1.1 of its authors, state {1, 2, 3, 4}.
    const next = xoshiro([1, 2, 3, 4]);
    expect(Array.from({ length: 10 }, next)).toEqual([
      11520, 0, 5927040, 70819200, 2031721883, 1637235492, 1287239034, 3734860849, 3729100597,
      4258142804,
    ]);
  });

  test('depend on the seed alone', () => {
    const draw = (seed: number) => Array.from({ length: 50 }, draws(seed));
    expect(draw(7)).toEqual(draw(7));
    expect(draw(7)).not.toEqual(draw(8));
  });

  test('take the same count of bits for every normal deviate', () => {
    const stream = randomStream(3);
    const twin = randomStream(3);
    for (let i = 0; i < 1000; i++) {
      stream.normal(1);
      twin.uniform();
    }
    expect(stream.bits()).toBe(twin.bits());
  });

  test('of a normal distribution have its moments and never correlate with the one before', () => {
    const stream = randomStream(1);
    const count = 200_000;
    const draws = Array.from({ length: count }, () => stream.normal(2) / 2);
    const moment = (power: number) => draws.reduce((sum, x) => sum + x ** power, 0) / count;
    const lagged = draws.slice(1).reduce((sum, x, i) => sum + x * draws[i]!, 0) / count;
    const within = 4 / Math.sqrt(count);
    expect(Math.abs(moment(1))).toBeLessThan(within);
    expect(Math.abs(moment(2) - 1)).toBeLessThan(within * Math.sqrt(2));
    expect(Math.abs(moment(3))).toBeLessThan(within * Math.sqrt(15));
    expect(Math.abs(moment(4) - 3)).toBeLessThan(within * Math.sqrt(96));
    expect(Math.abs(lagged)).toBeLessThan(within);
  });

  test('are never 0 and never 1', () => {
    const stream = randomStream(5);
    for (let i = 0; i < 10_000; i++) {
      const draw = stream.uniform();
      expect(draw > 0 && draw < 1).toBe(true);
    }
  });
});

function draws(seed: number): () => number {
  const stream = randomStream(seed);
  return () => stream.normal(1);
}
