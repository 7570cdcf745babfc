import { describe, expect, it } from 'vitest';
import { pValue, shareInterval, slopeWords } from '../../src/components/words/assumptions.ts';
import { citation } from '../../src/components/words/citation.ts';
import { timeLabel, weekdayLabel } from '../../src/components/words/dates.ts';
import { historyWords, ordinal } from '../../src/components/words/history.ts';
import { quotable } from '../../src/components/words/quotable.ts';
import type { Reading } from '../../src/components/words/reading.ts';
import { revisedAgainst } from '../../src/components/words/revisions.ts';
import { explainerStandfirst } from '../../src/components/words/standfirst.ts';

const reading: Reading = {
  period: '2031-08',
  growth: 1.143,
  expected: 0.3095,
  surprise: 0.84,
  forecastSe: 0.45,
  standardised: 1.9,
  cumulated: 1,
  change: 0.96,
  previousSurprise: -0.12,
  gap: 0.6,
  lower: 0.2,
  upper: 1,
  standing: 'estimate',
  persistent: true,
  name: 'Implied output gap',
  rho: 0.8,
  confidence: 0.8,
};

describe('the standfirst of an explainer', () => {
  it('states growth and expectation in per cent and the gap with its band', () => {
    expect(explainerStandfirst(reading, 'Broad money')).toBe(
      'Broad money rose 1.15 per cent on the month; 0.31 per cent was expected. ' +
        'The model reads that as output 0.6 per cent above trend, within a band of +0.2 to +1.0 per cent.',
    );
  });

  it('says fell where money shrank', () => {
    const fell = {
      ...reading,
      growth: -0.32,
      expected: 0.389,
      gap: -0.5,
      lower: -0.9,
      upper: -0.1,
    };
    expect(explainerStandfirst(fell, 'Broad money')).toBe(
      'Broad money fell 0.32 per cent on the month; growth of 0.39 per cent was expected. ' +
        'The model reads that as output 0.5 per cent below trend, within a band of −0.9 to −0.1 per cent.',
    );
  });

  it('is silent on a gap that is an assumption', () => {
    const assumed = { ...reading, standing: 'assumption' as const };
    expect(explainerStandfirst(assumed, 'Broad money')).toBe(
      'Broad money rose 1.15 per cent on the month; 0.31 per cent was expected.',
    );
  });

  it('calls the effect without persistence what it is', () => {
    const effect = { ...reading, persistent: false };
    const text = explainerStandfirst(effect, 'Broad money');
    expect(text).toContain('same-month effect on output of +0.6 per cent');
    expect(text).not.toContain('trend');
  });
});

describe('sentences to quote', () => {
  it('carry their size, period and source', () => {
    expect(quotable(reading, 'Costa Lirra', null)).toEqual([
      'Costa Lirra’s money growth was 0.84 percentage points above expectation in August 2031, according to Slackwater.',
      'Slackwater’s model implies output in Costa Lirra 0.6 per cent above trend in August 2031, within a band of +0.2 to +1.0 per cent; ' +
        'it is not a measurement of output.',
    ]);
  });

  it('say of an assumed gap what has to be said and nothing else', () => {
    const assumed = { ...reading, standing: 'assumption' as const };
    expect(quotable(assumed, 'Estavel', 'The gap is an assumption.')[1]).toBe(
      'The gap is an assumption.',
    );
  });

  it('call a surprise below .05 points level', () => {
    expect(quotable({ ...reading, surprise: -0.04 }, 'the Brannoch Isles', null)[0]).toBe(
      'The Brannoch Isles’ money growth was level with expectation in August 2031, according to Slackwater.',
    );
  });
});

describe('how a surprise stands in its history', () => {
  const fact = {
    period: '2031-08',
    surprise: {
      period: '2031-08',
      value: 0.84,
      side: 'above' as const,
      change: null,
      largest_since: { period: '2029-01', value: 1.25, from: '2029-01' },
      rank: { from_top: 2, by_size: 3, of: 120, from: '2021-09', to: '2031-08' },
      run: { periods: 4, from: '2031-05', to: '2031-08' },
    },
  };

  it('names records, runs and rank with the periods that prove them', () => {
    expect(historyWords(fact)).toBe(
      'The farthest above expectation since January 2029. Growth has been above expectation for four months, ' +
        'from May 2031 on. By size it ranks 3rd of the 120 months since September 2021.',
    );
  });

  it('keeps to the rank where the surprise is level', () => {
    const level = { ...fact, surprise: { ...fact.surprise, value: 0.03 } };
    expect(historyWords(level)).toBe(
      'By size it ranks 3rd of the 120 months since September 2021.',
    );
  });

  it('writes ordinals', () => {
    expect([1, 2, 3, 4, 11, 12, 13, 21, 112].map(ordinal)).toEqual([
      '1st',
      '2nd',
      '3rd',
      '4th',
      '11th',
      '12th',
      '13th',
      '21st',
      '112th',
    ]);
  });
});

describe('what was revised', () => {
  const now = { periods: ['2031-06', '2031-07', '2031-08'], surprise: [0.47, -0.12, 0.84] };
  const before = { periods: ['2031-06', '2031-07'], surprise: [0.44, -0.12] };

  it('marks what changed in print and leaves out the new month', () => {
    const revised = revisedAgainst(now, before, [{ period: '2031-06', value: 0.44 }]);
    expect(revised.rows.map(({ period, isChanged }) => [period, isChanged])).toEqual([
      ['2031-06', true],
      ['2031-07', false],
    ]);
    expect(revised.rows[1]!.first).toBeNull();
    expect(revised).toMatchObject({ compared: 2, changed: 1, signChanges: 0 });
  });

  it('does not mark a change too small to print', () => {
    const tiny = { periods: ['2031-06'], surprise: [0.472] };
    const revised = revisedAgainst(now, tiny, []);
    expect(revised.changed).toBe(0);
  });

  it('has nothing to compare with at the first release', () => {
    expect(revisedAgainst(now, null, [])).toMatchObject({ compared: 0, largest: null });
  });
});

describe('words of the assumptions', () => {
  it('give a share’s 80% interval, and none where it has no error', () => {
    const slope = { lambda: 0.35, se_lambda: 0.1 } as Parameters<typeof shareInterval>[0];
    expect(shareInterval(slope)).toBe('0.22 to 0.48');
    expect(shareInterval({ ...slope, se_lambda: null })).toBeNull();
  });

  it('give a fixed slope as the share it stands for', () => {
    expect(slopeWords({ method: 'fixed', b: 0.25, se_lambda: 0.03 }, 'monthly')).toBe(
      'Fixed at 0.20, with standard error 0.03',
    );
  });

  it('never print a p-value of zero', () => {
    expect(pValue(1e-9)).toBe('p\u00a0<\u00a00.001');
    expect(pValue(0.234)).toBe('p\u00a0=\u00a00.23');
  });
});

describe('dates and citations', () => {
  const at = new Date('2031-09-24T07:00:00Z');

  it('are in UTC', () => {
    expect(weekdayLabel(at)).toBe('Wed 24 Sep 2031');
    expect(timeLabel(at)).toBe('07:00\u00a0UTC');
  });

  it('name the release and where it stays', () => {
    const cited = citation({
      id: 'XCL-2031-08-r1',
      economyName: 'Costa Lirra',
      period: '2031-08',
      publishedAt: at,
      address: 'https://example.org/releases/XCL/2031-08/r1/',
      persistent: true,
    });
    expect(cited).toBe(
      'Slackwater (2031), “Costa Lirra: money surprise and implied output gap, August 2031”, release XCL-2031-08-r1, ' +
        '24 September 2031. Model-implied figures. https://example.org/releases/XCL/2031-08/r1/',
    );
  });
});
