import { describe, expect, test } from 'vitest';
import { demoEconomies } from '../../seed/economies.ts';
import { type ReleaseWords, releaseWords } from '../../seed/text.ts';
import { demoData } from '../../seed/vintages.ts';
import { growthFigure, surpriseFigure } from '../../src/lib/charts/figures.ts';
import { compute } from '../../src/lib/econ/compute.ts';
import { addPeriods } from '../../src/lib/econ/periods.ts';
import type { Assumptions, ComputeResult } from '../../src/lib/econ/types.ts';

const START = '2001-09';
const FORBIDDEN =
  /\b(boom|crash|soar|plunge|shock|good|bad|surge|slump|spike|tumble|rocket)(s|ed|ing|es)?\b/i;

interface Written extends ReleaseWords {
  code: string;
  nameInText: string;
  period: string;
  result: ComputeResult;
  assumptions: Assumptions;
}

/** Two years of releases of every economy under each version of its specification. */
const releases: Written[] = demoEconomies.flatMap((economy) => {
  const { code, nameInText, specifications } = economy;
  const data = demoData(economy, START);
  return specifications.flatMap(({ assumptions }) =>
    Array.from({ length: 24 }, (_, i) => {
      const vintage = data.vintage(336 + i);
      const series = (values: string[]) => ({ start: START, values: values.map(Number) });
      const result = compute({
        frequency: 'monthly',
        money: series(vintage.money),
        prices: series(vintage.prices),
        activity: series(vintage.activity),
        ...assumptions,
      });
      const release = { code, nameInText, period: addPeriods(START, 336 + i), result, assumptions };
      return { ...release, ...releaseWords(release) };
    }),
  );
});

const sentences = (text: string) => text.split(/(?<=\.) /);

describe('the words of a release', () => {
  test('keep to the house limits', () => {
    for (const { headline, explainer, code, period } of releases) {
      const which = `${code} ${period}`;
      expect(headline.length, which).toBeLessThanOrEqual(120);
      expect(headline, which).not.toMatch(/[.!?]$/);
      expect(sentences(explainer).length, which).toBeGreaterThanOrEqual(2);
      expect(sentences(explainer).length, which).toBeLessThanOrEqual(4);
    }
  });

  test('use the house voice', () => {
    for (const { headline, explainer } of releases) {
      const text = `${headline} ${explainer}`;
      expect(text).not.toMatch(FORBIDDEN);
      expect(text).not.toMatch(/undefined|NaN|null|%|\bpp\b/);
      expect(text).not.toMatch(/-\d/);
      expect(text).not.toMatch(/ {2}|\.\.|'/);
    }
  });

  test('print the surprise and the growth of the result', () => {
    for (const { explainer, result } of releases) {
      expect(explainer).toContain(surpriseFigure(result.surprise.at(-1)!));
      const growth = growthFigure(result.growth.at(-1)!);
      const said = growth === '0.00' ? 'did not change' : growth.replace('−', '');
      expect(explainer).toContain(said);
      expect(/broad money(, not seasonally adjusted,)? fell/i.test(explainer)).toBe(
        growth.startsWith('−'),
      );
    }
  });

  test('say above, below or level as the surprise is', () => {
    for (const { headline, explainer, result, code, period } of releases) {
      const surprise = result.surprise.at(-1)!;
      const which = `${code} ${period}: ${headline}`;
      if (Math.abs(surprise) < 0.05) {
        expect(headline, which).not.toMatch(/faster|slowly|above|below/);
        expect(headline, which).toMatch(/as expected|level/);
      } else {
        expect(headline, which).toMatch(surprise > 0 ? /faster|above/ : /slowly|below/);
        expect(headline, which).not.toMatch(surprise > 0 ? /slowly|below/ : /faster|above/);
        expect(explainer, which).not.toContain('level');
      }
    }
  });

  test('never lead with a gap', () => {
    for (const { headline } of releases) expect(headline).not.toMatch(/output|gap|trend/i);
  });

  test('call the gap of Estavel an assumption and give it no figure', () => {
    for (const { explainer } of releases.filter(({ code }) => code === 'XES')) {
      expect(explainer).toContain(
        'Prices in Estavel do not behave as the model requires; the gap is an assumption, not an estimate.',
      );
      expect(explainer).not.toMatch(/trend|band/);
    }
  });

  test('give the gap of the others on its side of trend, with its band', () => {
    for (const { explainer, result, code, period } of releases) {
      if (code === 'XES') continue;
      const gap = result.gap!.at(-1)!;
      const side = Number(gap.toFixed(1)) === 0 ? 'at' : gap > 0 ? 'above' : 'below';
      expect(explainer, `${code} ${period}`).toMatch(
        new RegExp(`${side} trend, within a band of \\S+ to \\S+ per cent`, 'u'),
      );
      expect(explainer).not.toContain('assumption');
    }
  });

  test('say of Farrowland alone that its money is not adjusted, and expect by the time of year', () => {
    for (const { code, explainer } of releases) {
      const unadjusted = code === 'XFA';
      expect(explainer.includes(', not seasonally adjusted, ')).toBe(unadjusted);
      expect(/was expected at this time of year[.;]/.test(explainer)).toBe(unadjusted);
    }
  });

  test('vary', () => {
    const forms = new Set(
      releases.map(({ headline, nameInText }) =>
        headline.replaceAll(new RegExp(nameInText, 'gi'), '').replaceAll(/[\d.]+/g, ''),
      ),
    );
    expect(forms.size).toBeGreaterThan(30);
  });

  test('are the same whenever they are written', () => {
    const last = releases.at(-1)!;
    expect(releaseWords(last)).toEqual(releaseWords(last));
  });
});

describe('the words of what a demo month may not bring', () => {
  const { result, ...last } = releases.find(({ code }) => code === 'XAL')!;
  const changed = (change: Partial<ComputeResult>) =>
    releaseWords({
      ...last,
      result: { ...result, ...change },
    });
  const lastOf = (values: number[], value: number) => [...values.slice(0, -1), value];

  test('no gap outside the model', () => {
    const outside = { gap: null, gap_lower: null, gap_upper: null, inflation: null };
    const { explainer } = changed({ ...outside, slope: { ...result.slope, within_model: false } });
    expect(explainer).toContain('No gap is published for Aldermark');
    expect(explainer).not.toMatch(/trend|They show/);
  });

  test('money that fell', () => {
    const { headline, explainer } = changed({
      growth: lastOf(result.growth, -0.32),
      expected_growth: lastOf(result.expected_growth, 0.39),
      surprise: lastOf(result.surprise, -0.71),
    });
    expect(headline).toMatch(
      /^Money in Aldermark fell 0\.32 per cent in \w+, 0\.71 points below expectation$/,
    );
    expect(explainer).toContain('growth of 0.39 per cent was expected');
  });

  test('money that was expected not to change', () => {
    const { explainer } = changed({ expected_growth: lastOf(result.expected_growth, -0.002) });
    expect(explainer).toMatch(/[;,] (where )?no change was expected\./);
  });

  test('money that did not change', () => {
    const { headline, explainer } = changed({
      growth: lastOf(result.growth, 0.001),
      surprise: lastOf(result.surprise, -0.4),
    });
    expect(headline).not.toMatch(/grew|faster|slowly/);
    expect(explainer).toContain('did not change');
  });

  test('a gap without persistence', () => {
    const words = releaseWords({ ...last, result, assumptions: { ...last.assumptions, gap: {} } });
    expect(words.explainer).toContain('The same-month output effect of the surprise is');
  });
});
