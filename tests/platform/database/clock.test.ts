import { sql } from 'kysely';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { connect } from '../../../db/connection.ts';
import { startClock } from '../../../src/lib/clock.ts';
import { type TestDatabase, testDatabase } from '../../setup/database.ts';

let database: TestDatabase;
beforeAll(async () => {
  database = await testDatabase();
});
afterAll(() => database.drop());

test('two processes’ clocks are the database’s to some milliseconds', async () => {
  const first = await startClock(database.db);
  const second = await startClock(database.db);
  const before = first.now().getTime();
  const { rows } = await sql<{ time: Date }>`select clock_timestamp() as time`.execute(database.db);
  const after = second.now().getTime();
  const time = rows[0]!.time.getTime();
  expect(time).toBeGreaterThan(before - 20);
  expect(time).toBeLessThan(after + 20);
  first.stop();
  second.stop();
});

test('a clock does not start without its database', async () => {
  const nowhere = connect('postgres://nobody@127.0.0.1:1/none');
  await expect(startClock(nowhere)).rejects.toThrow('ECONNREFUSED');
  await nowhere.destroy();
});
