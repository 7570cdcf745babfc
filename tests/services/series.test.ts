import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { getEconomy } from '../../src/lib/services/economies/public.ts';
import { announce } from '../../src/lib/services/calendar/announce.ts';
import { approveRelease } from '../../src/lib/services/releases/approve.ts';
import { computeRelease } from '../../src/lib/services/releases/compute.ts';
import { draftRelease } from '../../src/lib/services/releases/draft.ts';
import { scheduleRelease } from '../../src/lib/services/releases/schedule.ts';
import { submitRelease } from '../../src/lib/services/releases/submit.ts';
import { writeRelease } from '../../src/lib/services/releases/write.ts';
import { csvOf, longCsvOf } from '../../src/lib/services/series/csv.ts';
import { getSeries } from '../../src/lib/services/series/get.ts';
import { observations } from '../../src/lib/services/series/observations.ts';
import { approveSpecification } from '../../src/lib/services/specifications/approve.ts';
import { draftSpecification } from '../../src/lib/services/specifications/draft.ts';
import { type Desk, csv, openDesk, text } from './desk.ts';

let desk: Desk;
beforeAll(async () => {
  desk = await openDesk();
});
afterAll(() => desk.close());

const view = () => ({ at: new Date(desk.clock.at) });

/** Publishes a revision of a period from a vintage and moves the clock past its second. */
async function publish(
  economy: string,
  period: string,
  inputs: { vintageId: string; specificationId: string },
): Promise<string> {
  const editor = desk.as('editor');
  const id = await draftRelease(editor, { economy, period, ...inputs });
  await computeRelease(editor, id);
  const version = await desk.versionOf(id);
  await writeRelease(editor, { id, version, headline: 'Money grew', explainer: 'Words.' });
  await submitRelease(editor, id);
  await approveRelease(desk.as('reviewer'), { id, version: await desk.versionOf(id) });
  const at = new Date(desk.clock.at.getTime() + 3_600_000);
  await scheduleRelease(desk.as('reviewer'), { id, at });
  desk.clock.at = new Date(at.getTime() + 60_000);
  return id;
}

/** Money as readers find it: in the catalogue, in observations, and in both files. */
async function money(economy: string) {
  const series = (await getSeries(desk.db, view(), `${economy}.money.M`))!;
  const rows = await observations(desk.db, view(), series);
  const last = (file: string) => file.trimEnd().split('\r\n').at(-1);
  return {
    extent: series.lastPeriod,
    rows,
    last: rows.at(-1),
    file: last(csvOf(series, rows)),
    longFile: last(longCsvOf(series, rows)),
    release: series.releaseId,
  };
}

describe('an input series', () => {
  test('ends with the period its vintage was released for, whatever the file holds', async () => {
    await desk.economy('XTB');
    const vintageId = await desk.vintage('XTB');
    const specificationId = await desk.specification('XTB');
    const inputs = { vintageId, specificationId };
    const first = await publish('XTB', '2030-11', inputs);
    const early = await money('XTB');
    expect(early).toMatchObject({ extent: '2030-11', release: first });
    expect(early.rows).toHaveLength(59);
    expect(early.last).toMatchObject({ period: '2030-11', releaseId: first });
    expect(early.file).toMatch(/^2030-11,/);
    expect(early.longFile).toMatch(/^XTB\.money\.M,2030-11,/);

    const second = await publish('XTB', '2030-12', inputs);
    const late = await money('XTB');
    expect(late).toMatchObject({ extent: '2030-12', release: second });
    expect(late.file).toMatch(/^2030-12,/);
  });

  test('keeps its newest month and its figures when an older one is corrected', async () => {
    await desk.economy('XTC');
    const specificationId = await desk.specification('XTC');
    const rows = new TextDecoder().decode(csv()).split('\n');
    const until = (count: number) => text(rows.slice(0, count + 1).join('\n'));
    const older = await desk.vintage('XTC', until(59));
    await publish('XTC', '2030-10', { vintageId: older, specificationId });
    await publish('XTC', '2030-11', { vintageId: older, specificationId });
    const before = await money('XTC');
    const newer = await desk.vintage('XTC');
    expect(await publish('XTC', '2030-10', { vintageId: newer, specificationId })).toBe(
      'XTC-2030-10-r2',
    );
    const after = await money('XTC');
    expect(after.extent).toBe('2030-11');
    expect(after).toEqual(before);
  });
});

describe('the specification readers see', () => {
  const specify = async (economy: string, holdsFrom: string) => {
    const { id } = await draftSpecification(desk.as('editor'), {
      economy,
      reason: `From ${holdsFrom}.`,
      holdsFrom,
      assumptions: {
        expectation: { rule: 'random_walk', window: { kind: 'expanding', length: 24 } },
        slope: { method: 'fixed', b: 0.5 },
      },
    });
    await approveSpecification(desk.as('reviewer'), id);
    return id;
  };
  const inForce = async (economy: string) =>
    (await getEconomy(desk.db, view(), economy))?.specification?.version;
  const announceNext = (economy: string, period: string) =>
    announce(desk.as('reviewer'), {
      economy,
      period,
      dueAt: new Date(desk.clock.at.getTime() + 7 * 24 * 3_600_000),
    });

  test('is the newest that holds for the latest release, and from its period on the next', async () => {
    await desk.economy('XTE');
    const vintageId = await desk.vintage('XTE');
    const specificationId = await specify('XTE', '2020-01');
    await publish('XTE', '2030-11', { vintageId, specificationId });
    await specify('XTE', '2030-12');
    await specify('XTE', '2031-02');
    expect(await inForce('XTE')).toBe(1);
    await announceNext('XTE', '2030-12');
    expect(await inForce('XTE')).toBe(2);
  });

  test('is the first where all begin later', async () => {
    await desk.economy('XTF');
    await specify('XTF', '2031-02');
    await specify('XTF', '2031-04');
    await announceNext('XTF', '2031-01');
    expect(await inForce('XTF')).toBe(1);
  });
});
