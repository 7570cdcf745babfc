import { type Expression, type ExpressionBuilder, type SqlBool, sql } from 'kysely';
import type { Database } from '../../../../db/tables.ts';
import type { View } from '../view.ts';

/**
 * Whether a release is public in a view: its second has come and its pages are ready. A rehearsal counts what is
 * still to come although it is not ready yet; the one named by `include` counts in any state.
 */
export function isVisible(view: View) {
  return (eb: ExpressionBuilder<Database, 'release'>): Expression<SqlBool> => {
    const ready = eb('release.ready_for', '<=', view.at);
    const bySecond = view.rehearsedAt
      ? eb.or([
          ready,
          eb.and([
            eb('release.scheduled_for', '>', view.rehearsedAt),
            eb('release.scheduled_for', '<=', view.at),
          ]),
        ])
      : ready;
    const published = eb.and([eb('release.state', '=', 'scheduled'), bySecond]);
    return view.include ? eb.or([published, eb('release.id', '=', view.include)]) : published;
  };
}

/** The second at which a release became or will become public; in a preview of an unscheduled one, the view's own. */
export function publishedAt(view: View) {
  return sql<Date>`coalesce(release.scheduled_for, ${view.at})`;
}
