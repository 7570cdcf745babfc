import { RefusedError } from '../refusal.ts';
import type { Data } from '../series.ts';
import { emptyPath, type ExpectationPath } from './expectation.ts';
import { pastErrors } from './pastErrors.ts';

/**
 * Expectations as surveyed: the value at t is the growth of period t as expected at t − 1. Surveyed periods outside
 * money's growth are ignored.
 * @throws RefusedError where none lies inside it.
 */
export function surveyExpectation(data: Data): ExpectationPath {
  const exists = (t: number) => !Number.isNaN(data.surveyed[t]!);
  let first = 1;
  while (first < data.length && !exists(first)) first++;
  let end = first;
  while (end < data.length && exists(end)) end++;
  if (end === first) {
    throw new RefusedError([
      {
        pointer: '/surveyed_growth',
        message:
          'No surveyed period lies within the periods for which money growth is known, so there is no surprise to compute.',
      },
    ]);
  }
  const path = emptyPath(first, end - first);
  for (let t = first; t < end; t++) {
    path.expected[t - first] = data.surveyed[t]!;
    path.surprise[t - first] = data.growth[t]! - data.surveyed[t]!;
  }
  path.forecastError = pastErrors(path.surprise, data.rounding);
  return path;
}
