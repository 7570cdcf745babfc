import { sql } from 'kysely';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { record, verifyAudit } from '../../src/lib/services/audit.ts';
import { transact } from '../../src/lib/services/transact.ts';
import { createPerson } from '../../src/lib/services/people/create.ts';
import { type Desk, openDesk, PASSWORD } from './desk.ts';

let desk: Desk;
beforeAll(async () => {
  desk = await openDesk();
});
afterAll(() => desk.close());

describe('the audit trail', () => {
  test('follows row from row, though written by many at once', async () => {
    await Promise.all(['AAA', 'AAB', 'AAC', 'AAD'].map((code) => desk.submitted(code)));
    const { rows, brokenAt } = await verifyAudit(desk.db);
    expect(brokenAt).toBeNull();
    expect(rows).toBeGreaterThan(20);
  });

  test('and the change stand or fall together', async () => {
    const before = await verifyAudit(desk.db);
    const failing = transact(desk.as('editor'), async (trx) => {
      await record(trx, { action: 'test.done', subject: 'test' });
      throw new Error('afterwards');
    });
    await expect(failing).rejects.toThrow('afterwards');
    expect(await verifyAudit(desk.db)).toEqual(before);
    expect(await desk.trail('test')).toEqual([]);

    // Where the audit row cannot be written, the person is not there either.
    const unwritable = {
      ...desk.as('administrator'),
      actor: { ...desk.actors.administrator, id: 'nobody' },
    };
    const email = 'unaudited@example.org';
    await expect(
      createPerson(unwritable, { name: 'U', email, role: 'editor', password: PASSWORD }),
    ).rejects.toThrow();
    const person = desk.db.selectFrom('person').select('id').where('email', '=', email);
    expect(await person.executeTakeFirst()).toBeUndefined();
  });

  test('says when its time is a stepped one', async () => {
    const stepped = { ...desk.as('editor'), clockNote: 'stepped' as const };
    await transact(stepped, (trx) => record(trx, { action: 'test.stepped', subject: 'clock' }));
    await transact(desk.as('editor'), (trx) =>
      record(trx, { action: 'test.real', subject: 'clock' }),
    );
    const rows = await desk.db
      .selectFrom('audit')
      .select('detail')
      .where('subject', '=', 'clock')
      .orderBy('id')
      .execute();
    expect(rows.map((row) => row.detail)).toEqual([{ clock: 'stepped' }, {}]);
  });

  test('holds no password and no hash of one', async () => {
    const rows = await desk.db.selectFrom('audit').select('detail').execute();
    const accounts = await desk.db.selectFrom('account').select('password').execute();
    const told = JSON.stringify(rows);
    for (const secret of [PASSWORD, ...accounts.map((row) => row.password ?? '')]) {
      expect(told).not.toContain(secret);
    }
  });

  test.each([
    ['updated', sql`update audit set action = 'nothing'`],
    ['deleted', sql`delete from audit`],
    ['emptied', sql`truncate audit`],
  ])('is never %s', async (_how, statement) => {
    await expect(statement.execute(desk.db)).rejects.toThrow('written once and never changed');
  });

  test('shows where somebody has changed it all the same', async () => {
    const { id } = await desk.db
      .selectFrom('audit')
      .select('id')
      .orderBy('id')
      .offset(3)
      .limit(1)
      .executeTakeFirstOrThrow();
    await desk.db.transaction().execute(async (trx) => {
      await sql`alter table audit disable trigger audit_is_final`.execute(trx);
      await sql`update audit set detail = '{"role": "administrator"}' where id = ${id}`.execute(
        trx,
      );
      await sql`alter table audit enable trigger audit_is_final`.execute(trx);
    });
    expect(await verifyAudit(desk.db)).toEqual({ rows: 3, brokenAt: id });
  });
});
