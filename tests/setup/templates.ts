import type { Db } from '../../db/connection.ts';
import { migrate } from '../../db/migrate.ts';

interface Template {
  /** The template it is cloned from before it is filled. */
  base?: 'migrated';
  fill(db: Db, url: string): Promise<unknown>;
}

export type TemplateName = 'migrated' | 'seeded';

/** The databases that test databases are cloned from; each is made once a run, when first needed. */
export const templates: Record<TemplateName, Template> = {
  migrated: { fill: migrate },
  seeded: { base: 'migrated', fill: async () => {} },
};
