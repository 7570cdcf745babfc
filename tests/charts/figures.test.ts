import { describe, expect, it } from 'vitest';
import {
  accountingFigure,
  gapFigure,
  growthFigure,
  growthPercent,
  growthSize,
  hangs,
  monthName,
  periodLabel,
  periodNoun,
  range,
  side,
  standardisedFigure,
  surpriseFigure,
  withUnit,
} from '../../src/lib/charts/figures.ts';

describe('figures', () => {
  it('shows the sign of a surprise always, with the minus sign of mathematics', () => {
    expect(surpriseFigure(0.84)).toBe('+0.84');
    expect(surpriseFigure(-0.71)).toBe('\u22120.71');
    expect(surpriseFigure(12.34)).toBe('+12.34');
    expect(surpriseFigure(-1234.5)).toBe('\u22121234.50');
  });

  it('shows no sign where the printed figure is zero', () => {
    expect(surpriseFigure(0)).toBe('0.00');
    expect(surpriseFigure(-0)).toBe('0.00');
    expect(surpriseFigure(0.0049)).toBe('0.00');
    expect(surpriseFigure(-0.0049)).toBe('0.00');
    expect(gapFigure(-0.04)).toBe('0.0');
    expect(growthFigure(-0.001)).toBe('0.00');
  });

  it('says the size of a fall as the rate itself has it, not as the rate of the opposite rise', () => {
    expect(growthFigure(-10)).toBe('−9.52');
    expect(growthSize(-10)).toBe('9.52');
    expect(growthSize(10)).toBe('10.52');
  });

  it('prints gaps, standardised surprises and accounting parts with their own places', () => {
    expect(gapFigure(0.62)).toBe('+0.6');
    expect(standardisedFigure(-1.44)).toBe('\u22121.4');
    expect(accountingFigure(0.27)).toBe('+0.27');
  });

  it('prints growth in per cent from log points, unsigned when positive', () => {
    expect(growthPercent(100)).toBeCloseTo(171.828, 3);
    expect(growthFigure(1.1434)).toBe('1.15');
    expect(growthFigure(-0.3205)).toBe('\u22120.32');
    expect(growthFigure(120)).toBe('232.01');
  });

  it('joins units: none before %, a no-break space before pp and s.d.', () => {
    expect(withUnit('+0.84', 'pp')).toBe('+0.84\u00a0pp');
    expect(withUnit('+1.9', 's.d.')).toBe('+1.9\u00a0s.d.');
    expect(withUnit('+0.6', '%')).toBe('+0.6%');
    expect(withUnit(surpriseFigure(null), 'pp')).toBe('–');
  });

  it('prints ranges with both signs', () => {
    expect(range(0.2, 1.04)).toBe('+0.2 to +1.0');
    expect(range(-0.9, -0.06)).toBe('\u22120.9 to \u22120.1');
    expect(range(-0.6, 0.01)).toBe('\u22120.6 to 0.0');
    expect(range(null, 1)).toBe('–');
  });

  it('takes a decimal comma', () => {
    expect(surpriseFigure(0.84, { decimalMark: ',' })).toBe('+0,84');
    expect(range(0.2, 1, 1, { decimalMark: ',' })).toBe('+0,2 to +1,0');
  });

  it('prints an en dash where there is no value', () => {
    for (const value of [null, undefined, Number.NaN, Infinity]) {
      expect(surpriseFigure(value)).toBe('–');
    }
  });

  it('calls less than .05 level, and .05 a side', () => {
    expect([0.84, 0.05, 0.0499, 0, -0.0499, -0.05].map(side)).toEqual([
      'above',
      'above',
      'level',
      'level',
      'level',
      'below',
    ]);
    expect(side(null)).toBe('level');
  });

  it('lets hang what prints with a minus', () => {
    expect([-0.71, -0.03, -0.004, 0, 0.84].map((value) => hangs(value, 2))).toEqual([
      true,
      true,
      false,
      false,
      false,
    ]);
  });
});

describe('periods', () => {
  it('labels months, quarters and years', () => {
    expect(periodLabel('2031-08')).toBe('August 2031');
    expect(periodLabel('2031-08', 'short')).toBe('Aug 2031');
    expect(periodLabel('2000-Q4')).toBe('Q4 2000');
    expect(periodLabel('1970', 'short')).toBe('1970');
    expect(() => periodLabel('2031-13')).toThrow(RangeError);
  });

  it('names months and what a period is called', () => {
    expect(monthName(1)).toBe('January');
    expect(monthName(9, 'short')).toBe('Sep');
    expect(() => monthName(0)).toThrow(RangeError);
    expect(['2031-08', '2000-Q4', '1970'].map(periodNoun)).toEqual(['month', 'quarter', 'year']);
  });
});
