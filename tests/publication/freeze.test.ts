import { execFileSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { unzipSync } from 'fflate';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { bundleOf } from '../../src/lib/publication/bundle.ts';
import { openDesk, type Desk } from '../services/desk.ts';

let desk: Desk;
let files: Map<string, Uint8Array>;
let folder: string;

beforeAll(async () => {
  desk = await openDesk();
  folder = await mkdtemp(join(tmpdir(), 'slackwater-freeze-'));
  const id = await desk.approved('XTA');
  const rows = await desk.db
    .selectFrom('release_artefact')
    .select(['name', 'artefact_hash'])
    .where('release_id', '=', id)
    .execute();
  const { store } = desk.as('reviewer');
  files = new Map(
    await Promise.all(
      rows.map(async (row) => [row.name, (await store.get(row.artefact_hash))!] as const),
    ),
  );
});

afterAll(async () => {
  await desk.close();
  await rm(folder, { recursive: true });
});

const text = (name: string) => new TextDecoder().decode(files.get(name));

describe('a frozen release', () => {
  it('is recomputed byte for byte by the command from its request', async () => {
    const request = join(folder, 'request.json');
    await writeFile(request, files.get('request.json')!);
    const printed = execFileSync(
      process.execPath,
      ['--import', 'tsx', 'src/commands/compute.ts', request],
      { encoding: 'utf8' },
    );
    expect(printed).toBe(text('result.json'));
  });

  it('keeps facts and race, and the levels it was computed from', () => {
    const request = JSON.parse(text('request.json')) as { money: { start: string; values: [] } };
    const lines = text('inputs.csv').trim().split('\r\n');
    expect(lines[0]).toMatch(/^period,money/);
    expect(lines[1]).toMatch(new RegExp(`^${request.money.start},`));
    expect(lines).toHaveLength(request.money.values.length + 1);
    expect(JSON.parse(text('facts.json'))).toHaveProperty('surprise');
    expect(JSON.parse(text('race.json'))).toHaveProperty('rules.random_walk.rmse');
  });

  it('has a bundle of all files with the sums to check them by, the same bytes each time', () => {
    const bundle = unzipSync(files.get('bundle.zip')!);
    const sums = new TextDecoder().decode(bundle['SHA256SUMS']).trim().split('\n');
    const names = Object.keys(bundle).filter((name) => name !== 'SHA256SUMS');
    expect(names.toSorted()).toEqual(
      [...files.keys()].filter((name) => name !== 'bundle.zip').toSorted(),
    );
    expect(sums).toEqual(
      names.map((name) => {
        const hash = createHash('sha256').update(bundle[name]!).digest('hex');
        return `${hash}  ${name}`;
      }),
    );
    const again = bundleOf(names.reverse().map((name) => ({ name, bytes: bundle[name]! })));
    expect(Buffer.from(again).equals(Buffer.from(files.get('bundle.zip')!))).toBe(true);
  });
});
