import { describe, expect, it } from 'vitest';
import {
  accountingOf,
  accountingWords,
  sumsInPrint,
} from '../../src/components/words/accounting.ts';

const inflation = (
  actual: number,
  [expected_money, current_surprise, carry_over, unexplained]: (number | null)[],
) => ({
  actual: [actual],
  expected_money: [expected_money!],
  current_surprise: [current_surprise!],
  carry_over: [carry_over!],
  unexplained: [unexplained!],
});

describe('whether printed figures add', () => {
  it('says yes where rounded parts make the rounded total', () => {
    expect(sumsInPrint([0.27, 0.55, 0.07, -0.37], 0.52)).toBe(true);
  });

  it('says no where rounding takes a hundredth away, though the parts add exactly', () => {
    expect(sumsInPrint([0.104, 0.101], 0.204)).toBe(true);
    expect(sumsInPrint([0.104, 0.104, 0.104, 0.104], 0.416)).toBe(false);
  });

  it('is not misled by binary fractions', () => {
    expect(sumsInPrint([0.1, 0.2], 0.3)).toBe(true);
    expect(sumsInPrint([1.15, -0.31], 0.84)).toBe(true);
  });
});

describe('the accounting of a period', () => {
  it('prints each part by itself and keeps the total’s own rounding', () => {
    const accounting = accountingOf(inflation(0.416, [0.104, 0.104, 0.104, 0.104]), 0, '2031-08');
    expect(accounting?.parts.map(({ figure }) => figure)).toEqual([
      '+0.10',
      '+0.10',
      '+0.10',
      '+0.10',
    ]);
    expect(accounting?.totalFigure).toBe('+0.42');
    expect(accounting?.adds).toBe(false);
  });

  it('is not complete where a part does not exist', () => {
    const accounting = accountingOf(inflation(0.4, [0.2, 0.1, null, null]), 0, '2031-08');
    expect(accounting).toMatchObject({ isComplete: false, adds: false });
  });

  it('is none without inflation', () => {
    expect(accountingOf(null, 0, '2031-08')).toBeNull();
  });

  it('says by how much prices rose or fell against the model', () => {
    const rose = accountingOf(inflation(0.52, [0.27, 0.55, 0.07, -0.37]), 0, '2031-08')!;
    expect(accountingWords(rose, 'Consumer prices')).toBe(
      'Consumer prices rose 0.52 per cent. In log points, expected money less trend accounts for +0.27, ' +
        'the surprise for +0.55 and carry-over from earlier surprises for +0.07. ' +
        'That leaves 0.37 points unexplained: consumer prices rose by less than the model allows for.',
    );
    const fell = accountingOf(inflation(-0.2, [0.1, 0.1, 0, -0.4]), 0, '2031-08')!;
    expect(accountingWords(fell, 'Consumer prices')).toContain(
      'consumer prices fell by more than the model allows for.',
    );
  });
});
