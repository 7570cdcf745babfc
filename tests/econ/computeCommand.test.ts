import { spawnSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';
import { answer } from '../../src/commands/compute.ts';
import { compute } from '../../src/lib/econ/compute.ts';
import { request } from './economy.ts';

const root = fileURLToPath(new URL('../../', import.meta.url));
const read = (file: string | 0) => readFileSync(file, 'utf8');

describe('the compute command', () => {
  test('prints the result of a request on standard input', { timeout: 60_000 }, () => {
    const { status, stdout, stderr } = spawnSync(
      join(root, 'node_modules/.bin/tsx'),
      [join(root, 'src/commands/compute.ts'), '-'],
      { input: JSON.stringify(request({})), encoding: 'utf8' },
    );
    expect([status, stderr]).toEqual([0, '']);
    expect(stdout).toBe(`${JSON.stringify(compute(request({})))}\n`);
  });

  test('prints the result of a request in a file, and of a reference case', () => {
    const expected = { status: 0, out: JSON.stringify(compute(request({}))) };
    expect(answer(['request.json'], () => JSON.stringify(request({})))).toEqual(expected);
    const asCase = JSON.stringify({ name: 'made up', request: request({}), expected: {} });
    expect(answer(['case.json'], () => asCase)).toEqual(expected);
  });

  test('prints the problem document of a refused request and exits 2', () => {
    const refused = answer(['-'], () => JSON.stringify({ ...request({}), confidence: 2 }));
    expect([refused.status, refused.out]).toEqual([2, undefined]);
    expect(JSON.parse(refused.error!)).toMatchObject({
      status: 422,
      errors: [{ pointer: '/confidence' }],
    });
  });

  test('says in a sentence what it cannot read', () => {
    expect(answer([], read).error).toContain('Say which request to compute');
    expect(answer(['a', 'b'], read).error).toContain('Say which request to compute');
    expect(answer(['/no/such/file.json'], read).error).toBe('There is no file /no/such/file.json.');
    expect(answer([tmpdir()], read).error).toContain('is a folder');
    expect(answer(['-'], () => '{"frequency":').error).toContain(
      'Standard input is not valid JSON',
    );
    expect(answer(['-'], () => '').error).toContain('Standard input is empty');
    expect(answer([], read).status).toBe(1);
  });
});
