import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { approveSpecification } from '../../src/lib/services/specifications/approve.ts';
import { parseAssumptions } from '../../src/lib/services/specifications/assumptions.ts';
import { draftSpecification } from '../../src/lib/services/specifications/draft.ts';
import { listSpecifications } from '../../src/lib/services/specifications/list.ts';
import { submitRelease } from '../../src/lib/services/releases/submit.ts';
import { draftRelease } from '../../src/lib/services/releases/draft.ts';
import { type Desk, LAST, openDesk } from './desk.ts';

let desk: Desk;
beforeAll(async () => {
  desk = await openDesk();
});
afterAll(() => desk.close());

const walk = { rule: 'random_walk', window: { kind: 'expanding', length: 24 } };
const fixed = { method: 'fixed', b: 0.5 };

describe('assumptions', () => {
  test('are read as the computation reads them, with its defaults', () => {
    expect(parseAssumptions({ expectation: walk, slope: fixed }, 'monthly')).toEqual({
      expectation: { ...walk, seasonal: 'none' },
      slope: fixed,
      gap: { persistence: 'none' },
      confidence: 0.8,
    });
  });

  test('that cannot be computed with are refused, each fault at its field', () => {
    const wrong = {
      expectation: { ...walk, order: 2 },
      slope: { method: 'fixed', b: -1 },
      gap: { persistence: 1 },
      confidence: 2,
      data: [],
    };
    expect(() => parseAssumptions(wrong, 'monthly')).toThrow(
      expect.objectContaining({
        kind: 'invalid',
        faults: [
          'assumptions/data',
          'assumptions/expectation/order',
          'assumptions/slope/b',
          'assumptions/gap/persistence',
          'assumptions/confidence',
        ].map((field) => expect.objectContaining({ field })),
      }),
    );
  });
});

describe('a specification', () => {
  const draft = (economy: string, change = {}) =>
    draftSpecification(desk.as('editor'), {
      economy,
      reason: 'A reason.',
      holdsFrom: '2020-01',
      assumptions: { expectation: walk, slope: fixed },
      ...change,
    });

  test('is numbered within its economy, however many are drafted at once', async () => {
    await desk.economy('AAA');
    const versions = await Promise.all([draft('AAA'), draft('AAA'), draft('AAA')]);
    expect(versions.map(({ version }) => version).sort()).toEqual([1, 2, 3]);
    const listed = await listSpecifications(desk.as('reviewer'), 'AAA');
    expect(listed.map(({ version }) => version)).toEqual([3, 2, 1]);
  });

  test('has a reason and holds from a period of its economy', async () => {
    await desk.economy('AAB');
    await expect(draft('AAB', { reason: ' ' })).rejects.toMatchObject({
      faults: [{ field: 'reason' }],
    });
    await expect(draft('AAB', { holdsFrom: '2020-Q1' })).rejects.toMatchObject({
      faults: [{ field: 'holdsFrom' }],
    });
  });

  test('is approved once, never by who wrote it', async () => {
    await desk.economy('AAC');
    const { id } = await draft('AAC');
    const author = desk.context({ ...desk.actors.editor, role: 'reviewer' });
    await expect(approveSpecification(author, id)).rejects.toMatchObject({ kind: 'forbidden' });
    await Promise.all([1, 2].map(() => approveSpecification(desk.as('reviewer'), id)));
    expect(await desk.trail('specification AAC version 1')).toEqual([
      'specification.drafted',
      'specification.approved',
    ]);
  });

  test('must be approved before a release under it is submitted', async () => {
    await desk.economy('AAD');
    const vintageId = await desk.vintage('AAD');
    const { id: specificationId } = await draft('AAD');
    const inputs = { economy: 'AAD', period: LAST, vintageId, specificationId };
    const id = await draftRelease(desk.as('editor'), inputs);
    await expect(submitRelease(desk.as('editor'), id)).rejects.toMatchObject({
      faults: expect.arrayContaining([expect.objectContaining({ field: 'specification' })]),
    });
  });
});
