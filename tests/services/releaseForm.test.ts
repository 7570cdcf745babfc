import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { Typed } from '../../src/components/desk/form.ts';
import { takeStep } from '../../src/components/desk/releaseStep.ts';
import { computeRelease } from '../../src/lib/services/releases/compute.ts';
import { submitRelease } from '../../src/lib/services/releases/submit.ts';
import { writeRelease } from '../../src/lib/services/releases/write.ts';
import { type Desk, openDesk } from './desk.ts';

let desk: Desk;
beforeAll(async () => {
  desk = await openDesk();
});
afterAll(() => desk.close());

describe('an explainer', () => {
  const write = async (id: string, explainer: string) =>
    writeRelease(desk.as('editor'), {
      id,
      version: await desk.versionOf(id),
      headline: 'Money',
      explainer,
    });

  test('is refused where a line opens more than five quotations or lists', async () => {
    const id = await desk.draft('BBA');
    const marks = [
      '>'.repeat(19_990),
      '> '.repeat(6),
      'One.\n\n  - > 1. * + 2) six',
      '- '.repeat(9_990),
    ];
    for (const explainer of marks) {
      await expect(write(id, `${explainer}x`)).rejects.toMatchObject({
        kind: 'invalid',
        faults: [
          {
            field: 'explainer',
            message: 'Begin no line with more than 5 marks of quotations or lists.',
          },
        ],
      });
    }
  });

  test('may hold five, rules, and marks inside a line', async () => {
    const id = await desk.draft('BBB');
    const explainer = '> > - 1. * five\n\n------\n\n* * *\n\n********\n\na > b > c > d > e > f > g';
    await write(id, explainer);
    expect(await desk.release(id)).toMatchObject({ explainer });
  });
});

describe('a form of a draft that is sent twice', () => {
  const form = (id: string, step: string, version: number, explainer = 'Words.\r\nMore.') => {
    const data = new FormData();
    for (const [name, value] of Object.entries({ step, headline: 'Money', explainer })) {
      data.set(name, value);
    }
    data.set('version', String(version));
    return () => takeStep(desk.as('editor'), id, new Typed(data));
  };

  test('to submit it ends in review, once', async () => {
    const id = await desk.draft('BCA');
    await computeRelease(desk.as('editor'), id);
    const submit = form(id, 'submit', await desk.versionOf(id));
    await Promise.all([submit(), submit()]);
    await submit();
    expect((await desk.release(id)).state).toBe('in_review');
    const trail = await desk.trail(`release ${id}`);
    expect(trail.filter((action) => action === 'release.submitted')).toHaveLength(1);
    expect(trail.filter((action) => action === 'release.written')).toHaveLength(1);
  });

  test('to compute it is no fault, in review neither', async () => {
    const id = await desk.draft('BCB');
    const version = await desk.versionOf(id);
    const compute = form(id, 'compute', version);
    await Promise.all([compute(), compute()]);
    await submitRelease(desk.as('editor'), id);
    const before = await desk.release(id);
    await compute();
    expect(await desk.release(id)).toEqual(before);
  });

  test.each(['submit', 'compute'])(
    'with other words changes nothing in review: %s',
    async (step) => {
      const id = await desk.submitted(step === 'submit' ? 'BCC' : 'BCD');
      const late = form(id, step, await desk.versionOf(id), 'Other words.');
      await expect(late()).rejects.toMatchObject({ kind: 'conflict' });
      expect((await desk.release(id)).explainer).toBe('Words.');
    },
  );
});
