import { monthName } from '../../lib/charts/periodLabels.ts';

const weekdays = ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat'];

const two = (number: number) => String(number).padStart(2, '0');

/** "24 Sep 2031", in UTC. */
export function dateLabel(at: Date): string {
  return `${at.getUTCDate()} ${monthName(at.getUTCMonth() + 1, 'short')} ${at.getUTCFullYear()}`;
}

/** "Wed 24 Sep 2031", in UTC. */
export function weekdayLabel(at: Date): string {
  return `${weekdays[at.getUTCDay()]} ${dateLabel(at)}`;
}

/** "07:00 UTC", with seconds only where there are any. */
export function timeLabel(at: Date): string {
  const seconds = at.getUTCSeconds() === 0 ? '' : `:${two(at.getUTCSeconds())}`;
  return `${two(at.getUTCHours())}:${two(at.getUTCMinutes())}${seconds}\u00a0UTC`;
}

/** "24 September 2031", in UTC, for running text and citations. */
export function longDate(at: Date): string {
  return `${at.getUTCDate()} ${monthName(at.getUTCMonth() + 1)} ${at.getUTCFullYear()}`;
}
