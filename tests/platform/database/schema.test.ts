import { readFile } from 'node:fs/promises';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { dumpSchema } from '../../../db/dumpSchema.ts';
import { isMigrated } from '../../../db/migrate.ts';
import { type TestDatabase, testDatabase } from '../../setup/database.ts';

let database: TestDatabase;
beforeAll(async () => {
  database = await testDatabase();
});
afterAll(() => database.drop());

test('db/schema.sql is what the migrations make (npm run schema writes it anew)', async () => {
  expect(await isMigrated(database.db)).toBe(true);
  expect(await dumpSchema(database.url)).toBe(await readFile('db/schema.sql', 'utf8'));
});
