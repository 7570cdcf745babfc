import { describe, expect, test } from 'vitest';
import {
  addPeriods,
  comparePeriods,
  formatPeriod,
  frequencyOf,
  parsePeriod,
  periodDifference,
  periodsFrom,
  seasonOf,
} from '../../src/lib/econ/periods.ts';

describe('periods', () => {
  test('are read and written in ISO 8601', () => {
    for (const text of ['2031-04', '1999-12', '2031-Q2', '0000-Q1', '2031', '9999']) {
      expect(formatPeriod(parsePeriod(text))).toBe(text);
    }
    expect(frequencyOf('2031-04')).toBe('monthly');
    expect(frequencyOf('2031-Q4')).toBe('quarterly');
    expect(frequencyOf('2031')).toBe('annual');
  });

  test('of another form are refused in words', () => {
    for (const text of [
      '2031-13',
      '2031-00',
      '2031-Q5',
      '31',
      '2031-4',
      '2031-04-01',
      ' 2031',
      '',
    ]) {
      expect(frequencyOf(text)).toBeNull();
      expect(() => parsePeriod(text)).toThrow(RangeError);
    }
    expect(() => parsePeriod('2031', 'monthly')).toThrow('a month such as 2031-04');
  });

  test('run over year ends in both directions', () => {
    expect(periodsFrom('2030-11', 4, 'monthly')).toEqual([
      '2030-11',
      '2030-12',
      '2031-01',
      '2031-02',
    ]);
    expect(periodsFrom('2030-Q4', 2, 'quarterly')).toEqual(['2030-Q4', '2031-Q1']);
    expect(addPeriods('2031-01', -1)).toBe('2030-12');
    expect(addPeriods('2031', 10)).toBe('2041');
    expect(() => addPeriods('9999', 1)).toThrow('outside');
  });

  test('are compared and counted', () => {
    expect(periodDifference('2030-11', '2031-02')).toBe(3);
    expect(comparePeriods('2031-Q1', '2030-Q4')).toBe(1);
    expect(['2031-01', '2030-12'].sort(comparePeriods)).toEqual(['2030-12', '2031-01']);
    expect(() => periodDifference('2031', '2031-01')).toThrow(RangeError);
  });

  test('know their season', () => {
    expect(seasonOf(parsePeriod('2031-04').index, 'monthly')).toBe(3);
    expect(seasonOf(parsePeriod('2031-Q4').index, 'quarterly')).toBe(3);
    expect(seasonOf(parsePeriod('2031').index, 'annual')).toBe(0);
  });
});
