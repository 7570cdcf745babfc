import type { HistoryEntry } from '../../lib/services/releases/get.ts';
import { dateLabel, timeLabel } from '../words/dates.ts';

/** "24 Sep 2031, 07:00 UTC". */
export function momentLabel(at: Date): string {
  return `${dateLabel(at)}, ${timeLabel(at)}`;
}

/** What an entry of a release's history says: "Sent back by R. Reviewer: the headline misleads." */
export function historyWords({ action, person, detail }: HistoryEntry): string {
  const reason = typeof detail.reason === 'string' && detail.reason ? `: ${detail.reason}` : '';
  switch (action) {
    case 'release.drafted':
      return `Draft opened by ${person}`;
    case 'release.inputs_chosen':
      return `Data or specification changed by ${person}`;
    case 'release.computed':
      return `Computed by ${person}`;
    case 'release.written':
      return `Text saved by ${person}`;
    case 'release.submitted':
      return `Submitted for review by ${person}`;
    case 'release.sent_back':
      return `Sent back by ${person}${reason}`;
    case 'release.approved':
      return `Approved by ${person}`;
    case 'release.scheduled': {
      const at = typeof detail.at === 'string' ? ` for ${momentLabel(new Date(detail.at))}` : '';
      return `Scheduled${at} by ${person}${reason}`;
    }
    case 'release.unscheduled':
      return `Taken off the schedule by ${person}${reason}`;
    default:
      return `${action.replace('release.', '').replaceAll('_', ' ')}, ${person}`;
  }
}
