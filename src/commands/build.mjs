import { readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { CommandError, ROOT, run } from './run.mjs';
import { buildId } from './sources.mjs';

/** The built server, which exports `serve`. */
export const ENTRY = join(ROOT, 'dist/server/entry.mjs');

const STAMP = join(ROOT, 'dist/build-id');

/**
 * Builds the site unless this very state of the sources is what was built.
 * @param {import('./progress.mjs').Progress} [progress]
 * @param {AbortSignal} [signal]
 */
export async function buildWhenStale(progress, signal) {
  const id = await buildId();
  if ((await readFile(STAMP, 'utf8').catch(() => '')) === id) return;
  progress?.step('Building the site');
  const { code, output } = await run(
    process.execPath,
    [join(ROOT, 'node_modules/astro/astro.js'), 'build'],
    { env: { ...process.env, NODE_ENV: 'production', ASTRO_TELEMETRY_DISABLED: '1' }, signal },
  );
  if (code !== 0) {
    throw new CommandError(
      'The site could not be built: see the builder’s words above, and mend the sources.',
      output,
    );
  }
  await writeFile(STAMP, id);
}
