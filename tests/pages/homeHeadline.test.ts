import { describe, expect, it } from 'vitest';
import { homeHeadline, homeStandfirst } from '../../src/components/words/homeHeadline.ts';

const one = (nameInText: string, surprise: number, growth = 0.5) => ({
  nameInText,
  growth,
  surprise,
});
const august = (released: ReturnType<typeof one>[], expected = released.length) => ({
  period: '2031-08',
  released,
  expected,
});
const six = [
  one('Costa Lirra', 0.84),
  one('Farrowland', 0.46),
  one('Aldermark', 0.21),
  one('Estavel', 0.02),
  one('Dunmere', -0.33),
  one('the Brannoch Isles', -0.71, -0.32),
];

describe('the home page’s headline', () => {
  it('counts economies above expectation when all are out', () => {
    expect(homeHeadline(august(six))).toBe(
      'Money grew faster than expected in three of six economies in August',
    );
  });

  it('counts those released so far when some are not out', () => {
    expect(homeHeadline(august(six.slice(0, 4), 6))).toBe(
      'Money grew faster than expected in three of the four economies released so far for August',
    );
  });

  it('leads with the lower side where more economies are below', () => {
    expect(homeHeadline(august([six[0]!, six[4]!, six[5]!]))).toBe(
      'Money growth was below expectation in two of three economies in August',
    );
  });

  it('never says that money grew faster where it fell', () => {
    expect(homeHeadline(august([one('Aldermark', 0.4, -0.1), one('Estavel', 0.01)]))).toBe(
      'Money growth was above expectation in one of two economies in August',
    );
  });

  it('names both sides where they are equal', () => {
    expect(homeHeadline(august([one('Aldermark', 0.4), one('Estavel', -0.3)]))).toBe(
      'Money grew faster than expected in one of two economies in August and slower in one',
    );
  });

  it('calls surprises below .05 points level', () => {
    expect(homeHeadline(august([one('Aldermark', 0.049), one('Estavel', -0.04)]))).toBe(
      'Money grew as expected in all two economies in August',
    );
  });

  it('names the economy where only one is out', () => {
    expect(homeHeadline(august([one('the Brannoch Isles', -0.2)], 5))).toBe(
      'The Brannoch Isles’ money growth was below expectation in August',
    );
  });
});

describe('the lines under it', () => {
  it('name the largest surprise, the level ones and the other side', () => {
    expect(homeStandfirst(august(six))).toBe(
      'Costa Lirra’s surprise, +0.84 percentage points, was the largest. Estavel was level. ' +
        'Dunmere and the Brannoch Isles were below expectation.',
    );
  });

  it('give the figure alone where there is one economy', () => {
    expect(homeStandfirst(august([one('Aldermark', -0.2)], 5))).toBe(
      'The surprise was −0.20 percentage points.',
    );
  });
});
