import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { acceptVintage } from '../../src/lib/services/vintages/accept.ts';
import { getVintage } from '../../src/lib/services/vintages/get.ts';
import { listVintages } from '../../src/lib/services/vintages/list.ts';
import { sha256 } from '../../src/lib/publication/store.ts';
import { type Desk, csv, LAST, openDesk, text } from './desk.ts';

let desk: Desk;
beforeAll(async () => {
  desk = await openDesk();
  await desk.economy('AAA');
});
afterAll(() => desk.close());

const load = (bytes: Uint8Array, change = {}) =>
  acceptVintage(desk.as('editor'), {
    economy: 'AAA',
    fileName: 'money.csv',
    bytes,
    sourcePublishedAt: new Date('2031-09-25T09:00:00Z'),
    ...change,
  });

async function counts() {
  const count = (table: 'vintage' | 'vintage_series' | 'artefact' | 'audit') =>
    desk.db
      .selectFrom(table)
      .select((eb) => eb.fn.countAll<string>().as('count'))
      .executeTakeFirstOrThrow();
  return Promise.all((['vintage', 'vintage_series', 'artefact', 'audit'] as const).map(count));
}

describe('a vintage', () => {
  test('keeps the file under its hash and the digits of its levels', async () => {
    const bytes = text('period,money,prices\n2031-01,100.10,\n2031-02,101.00,90.50\n');
    const { id } = await load(bytes);
    const { vintage, series } = await getVintage(desk.as('reviewer'), id);
    expect(vintage).toMatchObject({ file_hash: sha256(bytes), file_size: String(bytes.length) });
    expect(await desk.as('editor').store.get(vintage.file_hash)).toEqual(Buffer.from(bytes));
    expect(series.map(({ concept, start, values }) => ({ concept, start, values }))).toEqual([
      { concept: 'money', start: '2031-01', values: ['100.10', '101.00'] },
      { concept: 'prices', start: '2031-02', values: ['90.50'] },
    ]);
  });

  test('is listed with the span of each series', async () => {
    const id = await desk.vintage('AAA');
    const listed = await listVintages(desk.as('editor'), 'AAA');
    expect(listed.find((vintage) => vintage.id === id)?.series).toEqual([
      { concept: 'money', first: '2026-01', last: LAST, periods: 60 },
      { concept: 'prices', first: '2026-01', last: LAST, periods: 60 },
    ]);
  });

  test('with any fault stores nothing', async () => {
    const before = await counts();
    await expect(load(text('period,money\n2031-01,1\n2031-02,0\n'))).rejects.toMatchObject({
      kind: 'invalid',
      fileFaults: [{ line: 3, column: 'money', found: '“0”' }],
    });
    await expect(load(new Uint8Array(40 * 1024 * 1024))).rejects.toMatchObject({
      kind: 'too_large',
    });
    await expect(load(csv(), { economy: 'ZZZ' })).rejects.toMatchObject({ kind: 'not_found' });
    await expect(load(text('period,money,activity\n2031-01,1,2\n'))).rejects.toMatchObject({
      fileFaults: [{ column: 'activity' }],
    });
    expect(await counts()).toEqual(before);
  });

  test('was published by its source before now', async () => {
    const later = new Date(desk.clock.at.getTime() + 1);
    await expect(load(csv(), { sourcePublishedAt: later })).rejects.toMatchObject({
      faults: [{ field: 'sourcePublishedAt' }],
    });
    await expect(load(csv(), { sourcePublishedAt: undefined })).rejects.toMatchObject({
      faults: [{ field: 'sourcePublishedAt' }],
    });
  });

  test('is one, though its form is sent twice at the same time', async () => {
    const bytes = text('period,money\n2030-01,1\n2030-02,2\n');
    const sent = await Promise.allSettled([load(bytes), load(bytes)]);
    expect(sent.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
  });
});
