import { periodNoun } from '../../lib/charts/periodLabels.ts';
import type { ComputeResult } from '../../lib/econ/types.ts';
import { gapSentence } from '../../lib/services/releases/sentences.ts';
import type { Reading } from './reading.ts';

/** What must stand beside the gap: why it is none, or no estimate. Null where it is an ordinary estimate. */
export function gapNotice(
  reading: Reading,
  result: Pick<ComputeResult, 'diagnostics' | 'slope'>,
  nameInText: string,
): string | null {
  if (reading.standing === 'none') {
    return `No output gap is shown yet: the first ${periodNoun(reading.period)}s of the history are left out until its start is forgotten.`;
  }
  return gapSentence(result, nameInText);
}
