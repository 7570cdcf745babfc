import type { Migration } from 'kysely';
import * as people from './2026-12-01-a-people.ts';
import * as releases from './2026-12-01-b-releases.ts';
import * as keys from './2026-12-01-c-keys.ts';

/** Every migration in order; a list and not a folder, so that the built server knows them too. */
export const migrations: Record<string, Migration> = {
  '2026-12-01-a-people': people,
  '2026-12-01-b-releases': releases,
  '2026-12-01-c-keys': keys,
};
