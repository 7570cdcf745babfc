import { RefusedError } from '../refusal.ts';
import type { ComputeRequest } from '../types.ts';
import { readExpectation } from './expectation.ts';
import { Reader, type Fields } from './reader.ts';
import { readSeries } from './series.ts';
import { readGap, readSlope } from './slope.ts';

const FIELDS = [
  'frequency',
  'money',
  'prices',
  'activity',
  'surveyed_growth',
  'expectation',
  'slope',
  'gap',
  'confidence',
] as const;

const DEFAULT_CONFIDENCE = 0.8;

/**
 * Reads a request of the contract from a value of any shape, with its defaults filled in.
 * @throws RefusedError with every fault of form and every faulty value.
 */
export function parseRequest(input: unknown): ComputeRequest {
  const reader = new Reader();
  const fields = reader.object(input, [], 'The request');
  if (fields === undefined) throw new RefusedError(reader.faults);
  reader.only(fields, [], FIELDS);
  const frequency = reader.choice(fields.frequency, ['frequency'], 'The frequency', [
    'monthly',
    'quarterly',
    'annual',
  ]);
  const expectation = readExpectation(reader, fields.expectation, ['expectation'], frequency);
  const slope = readSlope(reader, fields.slope, ['slope']);
  const gap = readGap(reader, fields.gap, ['gap']);
  const confidence =
    fields.confidence === undefined
      ? DEFAULT_CONFIDENCE
      : reader.number(
          fields.confidence,
          ['confidence'],
          'The confidence',
          'a number above 0 and below 1',
          (value) => value > 0 && (1 + value) / 2 < 1,
        );
  const series = (name: 'money' | 'prices' | 'activity') =>
    fields[name] === undefined
      ? undefined
      : readSeries(reader, fields[name], [name], 'level', frequency);
  const money = series('money');
  const prices = series('prices');
  const activity = series('activity');
  const surveyed =
    fields.surveyed_growth === undefined
      ? undefined
      : readSeries(reader, fields.surveyed_growth, ['surveyed_growth'], 'growth', frequency);
  tellMissingSeries(reader, fields, expectation?.rule, slope?.method, gap?.persistence);

  if (
    reader.faults.length > 0 ||
    frequency === undefined ||
    money === undefined ||
    expectation === undefined ||
    slope === undefined ||
    gap === undefined ||
    confidence === undefined
  ) {
    throw new RefusedError(reader.faults);
  }
  return {
    frequency,
    money,
    ...(prices && { prices }),
    ...(activity && { activity }),
    ...(surveyed && { surveyed_growth: surveyed }),
    expectation,
    slope,
    gap,
    confidence,
  };
}

function tellMissingSeries(
  reader: Reader,
  fields: Fields,
  rule: string | undefined,
  method: string | undefined,
  persistence: unknown,
): void {
  if (fields.money === undefined) reader.fault(['money'], 'The request needs a money series.');
  if (method === 'prices' && fields.prices === undefined) {
    reader.fault(['prices'], 'The slope method prices needs a prices series.');
  }
  if (method === 'activity' && fields.activity === undefined) {
    reader.fault(['activity'], 'The slope method activity needs an activity series.');
  } else if (persistence === 'estimated' && fields.activity === undefined) {
    reader.fault(['activity'], 'Persistence can only be estimated from an activity series.');
  }
  if (rule === 'survey' && fields.surveyed_growth === undefined) {
    reader.fault(['surveyed_growth'], 'The rule survey needs a series of surveyed growth.');
  }
}
