import type { Db } from '../../../../db/connection.ts';
import type { View } from '../view.ts';

/** An announced release that is not public yet. */
export interface Announced {
  economyCode: string;
  economyName: string;
  period: string;
  dueAt: Date;
  announcedAt: Date;
  /** Why the date was changed; empty at the first announcement. */
  reason: string;
}

/** Announced releases due after the view's instant, soonest first; the latest announcement of a month holds. */
export async function upcoming(db: Db, view: View, economy?: string): Promise<Announced[]> {
  let holding = db
    .selectFrom('announcement')
    .innerJoin('economy', 'economy.code', 'announcement.economy_code')
    .distinctOn(['announcement.economy_code', 'announcement.period'])
    .select([
      'announcement.economy_code as economyCode',
      'economy.name as economyName',
      'announcement.period',
      'announcement.due_at as dueAt',
      'announcement.announced_at as announcedAt',
      'announcement.reason',
    ])
    .where('announcement.announced_at', '<=', view.at)
    .orderBy('announcement.economy_code')
    .orderBy('announcement.period')
    .orderBy('announcement.announced_at', 'desc');
  if (economy) holding = holding.where('announcement.economy_code', '=', economy);
  return db
    .selectFrom(holding.as('holding'))
    .selectAll()
    .where('dueAt', '>', view.at)
    .orderBy('dueAt')
    .orderBy('economyCode')
    .execute();
}
