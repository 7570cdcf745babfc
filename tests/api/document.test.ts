import { afterAll, beforeAll, expect, it } from 'vitest';
import { z } from 'zod';
import { ask, openScene, type Scene } from './scene.ts';

interface Document {
  openapi: string;
  paths: Record<
    string,
    Record<string, { responses: Record<string, { content?: Record<string, { schema: object }> }> }>
  >;
  components: { schemas: Record<string, object> };
}

let scene: Scene;
let document: Document;
beforeAll(async () => {
  scene = await openScene();
  const response = await ask(scene.api, '/openapi.json', null);
  expect(response.status).toBe(200);
  document = (await response.json()) as Document;
});
afterAll(() => scene.desk.close());

/** The described schema of an answer, with what it refers to beside it. */
function schemaOf(path: string, method: string, status: number, type: string): z.ZodType {
  const described = document.paths[`/api/v1${path}`]?.[method]?.responses[status]?.content?.[type];
  if (!described) throw new Error(`${method} ${path} describes no ${status} in ${type}`);
  const whole = JSON.stringify({ ...described.schema, $defs: document.components.schemas });
  const local = JSON.parse(whole.replaceAll('#/components/schemas/', '#/$defs/')) as object;
  return z.fromJSONSchema(local as Parameters<typeof z.fromJSONSchema>[0]);
}

const EXAMPLES = [
  ['/economies', '/economies'],
  ['/economies/{code}', '/economies/XTB'],
  ['/series', '/series'],
  ['/series/{id}', '/series/XTB.money.M'],
  ['/series/{id}/observations', '/series/XTA.money_surprise_cumulated.M/observations'],
  ['/releases', '/releases'],
  ['/releases/{id}', '/releases/XTA-2030-12-r1'],
  ['/calendar', '/calendar'],
  ['/me', '/me'],
] as const;

it('describes every address there is, in OpenAPI 3.1', () => {
  expect(document.openapi).toBe('3.1.0');
  expect(Object.keys(document.paths).sort()).toEqual(
    [...EXAMPLES.map(([path]) => `/api/v1${path}`), '/api/v1/scenarios'].sort(),
  );
});

it.each(EXAMPLES)('%s answers as it describes', async (path, address) => {
  const answer: unknown = await (await scene.get(address)).json();
  schemaOf(path, 'get', 200, 'application/json').parse(answer);
  const refused: unknown = await (await ask(scene.api, address, null)).json();
  schemaOf(path, 'get', 401, 'application/problem+json').parse(refused);
});

it('POST /scenarios answers as it describes', async () => {
  const values = Array.from({ length: 40 }, (_, i) => 100 + i + (i % 3));
  const body = JSON.stringify({
    frequency: 'annual',
    money: { start: '1990', values },
    expectation: { rule: 'random_walk', window: { kind: 'expanding', length: 10 } },
    slope: { method: 'fixed', b: 0.5 },
  });
  const schema = (status: number, type: string) => schemaOf('/scenarios', 'post', status, type);
  schema(200, 'application/json').parse(await (await scene.post('/scenarios', body)).json());
  const refused: unknown = await (await scene.post('/scenarios', '{}')).json();
  schema(422, 'application/problem+json').parse(refused);
});
