import type { Api } from '../../api/context.ts';
import { createApi } from '../../api/app.ts';
import { compute } from '../../src/lib/econ/compute.ts';
import type { Assumptions } from '../../src/lib/econ/types.ts';
import type { Runtime } from '../../src/lib/runtime.ts';
import { createKey } from '../../src/lib/services/keys/create.ts';
import type { Scope } from '../../src/lib/services/keys/scopes.ts';
import { approveRelease } from '../../src/lib/services/releases/approve.ts';
import { computeRelease } from '../../src/lib/services/releases/compute.ts';
import { draftRelease } from '../../src/lib/services/releases/draft.ts';
import { scheduleRelease } from '../../src/lib/services/releases/schedule.ts';
import { submitRelease } from '../../src/lib/services/releases/submit.ts';
import { writeRelease } from '../../src/lib/services/releases/write.ts';
import { approveSpecification } from '../../src/lib/services/specifications/approve.ts';
import { draftSpecification } from '../../src/lib/services/specifications/draft.ts';
import { acceptVintage } from '../../src/lib/services/vintages/accept.ts';
import { csv, type Desk, openDesk, text } from '../services/desk.ts';

/** The seconds at which the scene's releases become public. */
export const FIRST_SECOND = '2031-10-01T08:00:00.000Z';
export const SECOND_SECOND = '2031-10-02T08:00:00.000Z';
export const COMING_SECOND = '2031-10-09T08:00:00.000Z';
/** Where the clock stands when the scene opens. */
export const NOW = '2031-10-05T12:00:00.000Z';

const WITHOUT_PERSISTENCE: Assumptions = {
  expectation: { rule: 'random_walk', window: { kind: 'expanding', length: 24 } },
  slope: { method: 'fixed', b: 0.5 },
};
const WITH_PERSISTENCE: Assumptions = { ...WITHOUT_PERSISTENCE, gap: { persistence: 0.5 } };

export type Scene = Awaited<ReturnType<typeof openScene>>;

/**
 * XTA has two public releases, 2030-11 and 2030-12, of two vintages, without persistence; XTB, whose money may not be
 * passed on, has one of 2030-11 with a persistent gap, and one of 2030-12 under embargo; XTD has a draft.
 */
export async function openScene() {
  const desk = await openDesk();
  await furnish(desk);
  const logged: unknown[] = [];
  const runtime = {
    env: { publicUrl: 'http://127.0.0.1:1', mode: 'demo' },
    db: desk.db,
    clock: { now: () => new Date(desk.clock.at) },
    workers: { compute: async (request: Parameters<typeof compute>[0]) => compute(request) },
    log: { error: (...told: unknown[]) => logged.push(told) },
  } as unknown as Runtime;
  const { plain: key } = await createKey(desk.as('editor'), {
    name: 'all',
    scopes: ['read', 'scenarios'],
  });
  const api = createApi(runtime);
  return {
    desk,
    runtime,
    api,
    key,
    /** What the process has logged as errors. */
    logged,
    get: (path: string, headers: Record<string, string> = {}) => ask(api, path, key, { headers }),
    post: (path: string, body: string, headers: Record<string, string> = {}) =>
      ask(api, path, key, {
        method: 'POST',
        body,
        headers: { 'content-type': 'application/json', ...headers },
      }),
    makeKey: (scopes: Scope[], who: 'subscriber' | 'editor' = 'subscriber') =>
      createKey(desk.as(who), { name: 'test', scopes }),
    setClock(at: string) {
      desk.clock.at = new Date(at);
    },
  };
}

/** Asks an API in process, with a key. */
export function ask(
  api: Api,
  path: string,
  key: string | null,
  init: { method?: string; body?: string; headers?: Record<string, string> } = {},
): Promise<Response> {
  const authorization: Record<string, string> = key ? { authorization: `Bearer ${key}` } : {};
  return Promise.resolve(
    api.request(`/api/v1${path}`, { ...init, headers: { ...authorization, ...init.headers } }),
  );
}

async function furnish(desk: Desk): Promise<void> {
  const rows = new TextDecoder().decode(csv()).split('\n');
  const until = (count: number) => text(rows.slice(0, count + 1).join('\n'));

  await desk.economy('XTA');
  const plain = await specify(desk, 'XTA', WITHOUT_PERSISTENCE);
  await release(desk, {
    economy: 'XTA',
    period: '2030-11',
    bytes: until(59),
    specificationId: plain,
    at: FIRST_SECOND,
  });
  desk.clock.at = new Date('2031-10-01T09:00:00Z');
  await release(desk, {
    economy: 'XTA',
    period: '2030-12',
    bytes: revised(until(60)),
    specificationId: plain,
    at: SECOND_SECOND,
  });

  const series = { timing: 'average', adjustment: 'unadjusted', unit: 'index' } as const;
  const invented = { source: 'Invented for a test', licence: 'none', serveValues: false };
  await desk.economy('XTB', {
    name: 'Testburg',
    series: {
      money: { title: 'Broad money', ...series, ...invented },
      prices: { title: 'Consumer prices', ...series, ...invented, serveValues: true },
    },
  });
  const persistent = await specify(desk, 'XTB', WITH_PERSISTENCE);
  const common = { economy: 'XTB', specificationId: persistent };
  await release(desk, { ...common, period: '2030-11', bytes: until(59), at: SECOND_SECOND });
  desk.clock.at = new Date(NOW);
  await release(desk, { ...common, period: '2030-12', bytes: until(60), at: COMING_SECOND });

  await desk.draft('XTD');
}

/** Another last figure of money than the vintage before had for its own last month. */
function revised(bytes: Uint8Array): Uint8Array {
  const rows = new TextDecoder().decode(bytes).split('\n');
  rows[59] = rows[59]!.replace(/^([^,]+),[^,]+/, '$1,160.10');
  return text(rows.join('\n'));
}

async function specify(desk: Desk, economy: string, assumptions: Assumptions): Promise<string> {
  const { id } = await draftSpecification(desk.as('editor'), {
    economy,
    reason: 'Fixed for a test.',
    holdsFrom: '2020-01',
    assumptions,
  });
  await approveSpecification(desk.as('reviewer'), id);
  return id;
}

async function release(
  desk: Desk,
  made: {
    economy: string;
    period: string;
    bytes: Uint8Array;
    specificationId: string;
    at: string;
  },
): Promise<void> {
  const { economy, period, bytes, specificationId, at } = made;
  const editor = desk.as('editor');
  const { id: vintageId } = await acceptVintage(editor, {
    economy,
    fileName: `${economy}.csv`,
    bytes,
    sourcePublishedAt: new Date(desk.clock.at.getTime() - 3_600_000),
  });
  const id = await draftRelease(editor, { economy, period, vintageId, specificationId });
  await computeRelease(editor, id);
  const version = await desk.versionOf(id);
  await writeRelease(editor, {
    id,
    version,
    headline: `${economy} ${period} is out`,
    explainer: 'Words.',
  });
  await submitRelease(editor, id);
  await approveRelease(desk.as('reviewer'), { id, version: await desk.versionOf(id) });
  await scheduleRelease(desk.as('reviewer'), { id, at: new Date(at) });
}
