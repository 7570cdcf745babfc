/** What calls are counted over, the shortest first; both of UTC. */
export const SPANS = ['minute', 'month'] as const;
export type Span = (typeof SPANS)[number];

const MINUTE_MS = 60_000;

/** The minute or month that an instant lies in: from `startsAt` until just before `endsAt`. */
export function spanOf(span: Span, now: Date): { startsAt: Date; endsAt: Date } {
  if (span === 'minute') {
    const start = Math.floor(now.getTime() / MINUTE_MS) * MINUTE_MS;
    return { startsAt: new Date(start), endsAt: new Date(start + MINUTE_MS) };
  }
  const [year, month] = [now.getUTCFullYear(), now.getUTCMonth()];
  return {
    startsAt: new Date(Date.UTC(year, month, 1)),
    endsAt: new Date(Date.UTC(year, month + 1, 1)),
  };
}
