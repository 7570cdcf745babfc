import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { lockPublication } from '../../db/queries/publicationLock.ts';
import { approveRelease } from '../../src/lib/services/releases/approve.ts';
import { chooseInputs } from '../../src/lib/services/releases/chooseInputs.ts';
import { computeRelease } from '../../src/lib/services/releases/compute.ts';
import { draftRelease } from '../../src/lib/services/releases/draft.ts';
import { getDeskRelease } from '../../src/lib/services/releases/get.ts';
import { scheduleRelease } from '../../src/lib/services/releases/schedule.ts';
import { sendBackRelease } from '../../src/lib/services/releases/sendBack.ts';
import { submitRelease } from '../../src/lib/services/releases/submit.ts';
import { unscheduleRelease } from '../../src/lib/services/releases/unschedule.ts';
import { writeRelease } from '../../src/lib/services/releases/write.ts';
import { type Desk, LAST, openDesk } from './desk.ts';

let desk: Desk;
beforeAll(async () => {
  desk = await openDesk();
});
afterAll(() => desk.close());

const ahead = (seconds: number) => new Date(desk.clock.at.getTime() + seconds * 1000);

describe('a draft', () => {
  test('is computed from nothing after its reference period', async () => {
    await desk.economy('AAA');
    const vintageId = await desk.vintage('AAA');
    const specificationId = await desk.specification('AAA');
    const id = await draftRelease(desk.as('editor'), {
      economy: 'AAA',
      period: '2030-06',
      vintageId,
      specificationId,
    });
    expect(id).toBe('AAA-2030-06-r1');
    const result = await computeRelease(desk.as('editor'), id);
    expect(result.periods.at(-1)).toBe('2030-06');
    const { request } = await desk.release(id);
    expect(request).toMatchObject({ money: { start: '2026-01', timing: 'average' } });
    expect((request as { money: { values: number[] } }).money.values).toHaveLength(54);
  });

  test('is of a period that the data have', async () => {
    await desk.economy('AAB');
    const vintageId = await desk.vintage('AAB');
    const specificationId = await desk.specification('AAB');
    const draft = (period: string) =>
      draftRelease(desk.as('editor'), { economy: 'AAB', period, vintageId, specificationId });
    await expect(draft('2031-01')).rejects.toMatchObject({ faults: [{ field: 'period' }] });
    await expect(draft('2030-Q4')).rejects.toMatchObject({ faults: [{ field: 'period' }] });
  });

  test('takes data and specification of its own economy only', async () => {
    await desk.economy('AAC');
    await desk.economy('AAD');
    const vintageId = await desk.vintage('AAD');
    const specificationId = await desk.specification('AAC');
    await expect(
      draftRelease(desk.as('editor'), {
        economy: 'AAC',
        period: LAST,
        vintageId,
        specificationId,
      }),
    ).rejects.toMatchObject({ kind: 'invalid', faults: [{ field: 'vintageId' }] });
  });

  test('is one a period, however often the form is sent', async () => {
    const id = await desk.draft('AAE');
    const { vintage_id: vintageId, specification_id: specificationId } = await desk.release(id);
    const again = { economy: 'AAE', period: LAST, vintageId, specificationId };
    const sent = await Promise.allSettled(
      [1, 2, 3].map(() => draftRelease(desk.as('editor'), again)),
    );
    expect(sent.map(({ status }) => status)).toEqual(['rejected', 'rejected', 'rejected']);
  });

  test('loses its figures when it takes other data', async () => {
    const id = await desk.draft('AAF');
    await computeRelease(desk.as('editor'), id);
    const before = await desk.release(id);
    const vintageId = await desk.vintage('AAF', new TextEncoder().encode(short));
    await expect(
      chooseInputs(desk.as('editor'), {
        id,
        version: before.version,
        vintageId,
        specificationId: before.specification_id,
      }),
    ).rejects.toMatchObject({ faults: [{ field: 'period' }] });
    expect((await desk.release(id)).result).not.toBeNull();
    const other = await desk.specification('AAF');
    await chooseInputs(desk.as('otherEditor'), {
      id,
      version: before.version,
      vintageId: before.vintage_id,
      specificationId: other,
    });
    expect(await desk.release(id)).toMatchObject({
      result: null,
      request: null,
      computed_at: null,
    });
  });
});

const short = 'period,money\n2030-01,1\n2030-02,2\n';

describe('the words of a draft', () => {
  test('are never overwritten by somebody who saw an older version', async () => {
    const id = await desk.draft('BAA');
    const version = await desk.versionOf(id);
    await writeRelease(desk.as('editor'), { id, version, headline: 'First', explainer: 'One.' });
    await expect(
      writeRelease(desk.as('otherEditor'), { id, version, headline: 'Second', explainer: 'Two.' }),
    ).rejects.toMatchObject({ kind: 'conflict' });
    expect(await desk.release(id)).toMatchObject({ headline: 'First', explainer: 'One.' });
  });

  test('are one change when the form is sent twice', async () => {
    const id = await desk.draft('BAB');
    const version = await desk.versionOf(id);
    const sent = { id, version, headline: 'Money', explainer: 'Line\r\nline' };
    const versions = await Promise.all([1, 2].map(() => writeRelease(desk.as('editor'), sent)));
    expect(versions).toEqual([version + 1, version + 1]);
    expect(await desk.trail(`release ${id}`)).toEqual(['release.drafted', 'release.written']);
  });

  test('have their length', async () => {
    const id = await desk.draft('BAC');
    const version = await desk.versionOf(id);
    await expect(
      writeRelease(desk.as('editor'), {
        id,
        version,
        headline: 'h'.repeat(121),
        explainer: 'e'.repeat(20_001),
      }),
    ).rejects.toMatchObject({ faults: [{ field: 'headline' }, { field: 'explainer' }] });
  });
});

describe('review', () => {
  test('begins when nothing is missing, and says all that is', async () => {
    const id = await desk.draft('CAA');
    await expect(submitRelease(desk.as('editor'), id)).rejects.toMatchObject({
      kind: 'invalid',
      faults: [{ field: 'compute' }, { field: 'headline' }, { field: 'explainer' }],
    });
  });

  test('begins once, though submitted twice at the same time', async () => {
    const id = await desk.submitted('CAB');
    await Promise.all([submitRelease(desk.as('editor'), id), submitRelease(desk.as('editor'), id)]);
    const trail = await desk.trail(`release ${id}`);
    expect(trail.filter((action) => action === 'release.submitted')).toHaveLength(1);
  });

  test('returns a release with the reason, and the words can be changed again', async () => {
    const id = await desk.submitted('CAC');
    await expect(
      writeRelease(desk.as('editor'), {
        id,
        version: await desk.versionOf(id),
        headline: 'Late',
        explainer: 'Late',
      }),
    ).rejects.toMatchObject({ kind: 'conflict' });
    await expect(sendBackRelease(desk.as('reviewer'), { id, reason: ' ' })).rejects.toMatchObject({
      faults: [{ field: 'reason' }],
    });
    await sendBackRelease(desk.as('reviewer'), { id, reason: 'The headline misleads.' });
    expect(await desk.release(id)).toMatchObject({
      state: 'draft',
      returned_reason: 'The headline misleads.',
    });
  });

  test.each(['data', 'specification', 'words'] as const)(
    'is never decided by somebody who made its %s, whatever their role is now',
    async (part) => {
      const id = await desk.submitted({ data: 'CBA', specification: 'CBB', words: 'CBC' }[part]);
      const { reviewer } = desk.actors;
      await desk.db
        .insertInto('release_contributor')
        .values({ release_id: id, person_id: reviewer.id, part })
        .execute();
      const version = await desk.versionOf(id);
      const refused = { kind: 'forbidden' };
      await expect(approveRelease(desk.as('reviewer'), { id, version })).rejects.toMatchObject(
        refused,
      );
      await expect(
        sendBackRelease(desk.as('reviewer'), { id, reason: 'No.' }),
      ).rejects.toMatchObject(refused);
      expect((await desk.release(id)).state).toBe('in_review');
    },
  );

  test('an editor who became a reviewer does not approve own work', async () => {
    const id = await desk.submitted('CBD');
    const promoted = desk.context({ ...desk.actors.editor, role: 'reviewer' });
    await expect(
      approveRelease(promoted, { id, version: await desk.versionOf(id) }),
    ).rejects.toMatchObject({
      kind: 'forbidden',
      message: expect.stringContaining('You loaded its data'),
    });
  });

  test('approves what was seen, once, and keeps its values', async () => {
    const id = await desk.submitted('CCA');
    const version = await desk.versionOf(id);
    await expect(
      approveRelease(desk.as('reviewer'), { id, version: version - 1 }),
    ).rejects.toMatchObject({ kind: 'conflict' });
    await Promise.all([1, 2].map(() => approveRelease(desk.as('reviewer'), { id, version })));
    const trail = await desk.trail(`release ${id}`);
    expect(trail.filter((action) => action === 'release.approved')).toHaveLength(1);
    const values = await desk.db
      .selectFrom('release_value')
      .select('indicator')
      .where('release_id', '=', id)
      .where('period', '=', LAST)
      .execute();
    expect(values.map((row) => row.indicator)).toContain('money_surprise');
  });

  test('sent back after approval, a release is frozen anew', async () => {
    const id = await desk.approved('CCB');
    await sendBackRelease(desk.as('reviewer'), { id, reason: 'A late doubt.' });
    await submitRelease(desk.as('editor'), id);
    await approveRelease(desk.as('reviewer'), { id, version: await desk.versionOf(id) });
    expect((await desk.release(id)).state).toBe('approved');
  });
});

describe('the schedule', () => {
  test('takes a second at least five seconds ahead', async () => {
    const id = await desk.approved('DAA');
    for (const at of [ahead(-1), ahead(4), new Date(ahead(60).getTime() + 1)]) {
      await expect(scheduleRelease(desk.as('reviewer'), { id, at })).rejects.toMatchObject({
        faults: [{ field: 'at' }],
      });
    }
    await scheduleRelease(desk.as('reviewer'), { id, at: ahead(5) });
    expect(await desk.release(id)).toMatchObject({ state: 'scheduled', ready_for: ahead(5) });
  });

  test('announces a time once, and a change of it only with a reason', async () => {
    const id = await desk.approved('DAB');
    const at = ahead(3600);
    await Promise.all([1, 2].map(() => scheduleRelease(desk.as('reviewer'), { id, at })));
    await unscheduleRelease(desk.as('reviewer'), { id, reason: 'The source restates.' });
    const later = ahead(7200);
    await expect(scheduleRelease(desk.as('reviewer'), { id, at: later })).rejects.toMatchObject({
      faults: [{ field: 'reason' }],
    });
    desk.clock.at = ahead(1);
    await scheduleRelease(desk.as('reviewer'), { id, at: later, reason: 'The source restates.' });
    const announced = await desk.db
      .selectFrom('announcement')
      .select(['due_at', 'reason'])
      .where('economy_code', '=', 'DAB')
      .orderBy('announced_at')
      .execute();
    expect(announced).toEqual([
      { due_at: at, reason: '' },
      { due_at: later, reason: 'The source restates.' },
    ]);
  });

  test('is left only when nobody is drawing its moment', async () => {
    const id = await desk.scheduled('DAD', ahead(600));
    let isDone = false;
    let leaving: Promise<void> | undefined;
    await desk.db.transaction().execute(async (trx) => {
      await lockPublication(trx);
      leaving = unscheduleRelease(desk.as('reviewer'), { id, reason: 'Wait.' }).then(() => {
        isDone = true;
      });
      await new Promise((resolve) => setTimeout(resolve, 300));
      expect(isDone).toBe(false);
    });
    await leaving;
    expect((await desk.release(id)).state).toBe('approved');
  });

  test('is left with a reason, not once the release is about to be public', async () => {
    const at = ahead(60);
    const id = await desk.scheduled('DAC', at);
    await expect(unscheduleRelease(desk.as('reviewer'), { id, reason: '' })).rejects.toMatchObject({
      faults: [{ field: 'reason' }],
    });
    desk.clock.at = new Date(at.getTime() - 2000);
    await expect(
      unscheduleRelease(desk.as('reviewer'), { id, reason: 'Stop.' }),
    ).rejects.toMatchObject({ kind: 'conflict' });
    desk.clock.at = at;
    await expect(
      unscheduleRelease(desk.as('reviewer'), { id, reason: 'Stop.' }),
    ).rejects.toMatchObject({ kind: 'conflict', message: expect.stringContaining('published') });
    const { state } = await getDeskRelease(desk.as('editor'), id);
    expect(state).toBe('published');
  });
});

describe('a look at a release', () => {
  test('is recorded until the release is public', async () => {
    const at = ahead(10);
    const id = await desk.scheduled('EAA', at);
    await getDeskRelease(desk.as('reviewer'), id);
    await getDeskRelease(desk.as('editor'), id);
    desk.clock.at = at;
    await getDeskRelease(desk.as('editor'), id);
    const trail = await desk.trail(`release ${id}`);
    expect(trail.filter((action) => action === 'release.viewed')).toHaveLength(2);
  });

  test('shows what happened to it, newest first', async () => {
    const id = await desk.submitted('EAB');
    const { history, missing } = await getDeskRelease(desk.as('reviewer'), id);
    expect(history.map((entry) => entry.action)).toEqual([
      'release.submitted',
      'release.written',
      'release.computed',
      'release.drafted',
    ]);
    expect(missing).toEqual([]);
  });
});
