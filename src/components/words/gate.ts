import { periodNoun } from '../../lib/charts/periodLabels.ts';
import type { Reading } from './reading.ts';

/** The quotable sentence on the gap where the model's own test rejects it. */
export function gateSentence(nameInText: string): string {
  return `Prices in ${nameInText} do not behave as the model requires; the gap is an assumption, not an estimate.`;
}

/** Why there is no gap, or no estimate of one; null where there is. */
export function gapNotice(reading: Reading, nameInText: string): string | null {
  switch (reading.standing) {
    case 'assumption':
      return gateSentence(nameInText);
    case 'outside':
      return `No output gap is published for ${nameInText}: the estimate lies outside what the model allows.`;
    case 'none':
      return `No output gap is shown yet: the first ${periodNoun(reading.period)}s after the start of the history are left out.`;
    case 'estimate':
      return null;
  }
}
