import type { Assumptions, Fault, Frequency } from '../../econ/types.ts';
import { readExpectation } from '../../econ/validate/expectation.ts';
import { Reader } from '../../econ/validate/reader.ts';
import { readGap, readSlope } from '../../econ/validate/slope.ts';
import { ServiceError } from '../context.ts';

const FIELDS = ['expectation', 'slope', 'gap', 'confidence'];

/**
 * Assumptions from a value of any shape, read as the computation reads them, without data.
 * @throws ServiceError `invalid`, its faults under the path in the assumptions.
 */
export function parseAssumptions(value: unknown, frequency: Frequency): Assumptions {
  const reader = new Reader();
  const fields = reader.object(value, [], 'The assumptions');
  if (!fields) throw refused(reader.faults);
  reader.only(fields, [], FIELDS);
  const expectation = readExpectation(reader, fields.expectation, ['expectation'], frequency);
  const slope = readSlope(reader, fields.slope, ['slope']);
  const gap = readGap(reader, fields.gap, ['gap']);
  const confidence =
    fields.confidence === undefined
      ? 0.8
      : reader.number(
          fields.confidence,
          ['confidence'],
          'The confidence',
          'a number above 0 and below 1',
          (number) => number > 0 && number < 1,
        );
  if (reader.faults.length > 0 || !expectation || !slope || confidence === undefined) {
    throw refused(reader.faults);
  }
  return { expectation, slope, ...(gap && { gap }), confidence };
}

function refused(faults: Fault[]): ServiceError {
  return new ServiceError(
    'invalid',
    'The assumptions cannot be computed with as they stand.',
    faults.map(({ pointer, message }) => ({ field: `assumptions${pointer}`, message })),
  );
}
