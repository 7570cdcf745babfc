import type { Db } from '../../../../db/connection.ts';
import type { View } from '../view.ts';
import { listSeries, type SeriesInfo } from './list.ts';

const ID = /^([A-Z]{3})\.([a-z_]+)\.[MQA]$/;

/** One series of the catalogue, or null where it is unknown or not public in the view. */
export async function getSeries(db: Db, view: View, id: string): Promise<SeriesInfo | null> {
  const [, economy, concept] = ID.exec(id) ?? [];
  if (!economy || !concept) return null;
  const found = await listSeries(db, view, { economy, concept });
  return found.find((series) => series.id === id) ?? null;
}
