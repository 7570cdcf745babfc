import { existsSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { workerData as threadData } from 'node:worker_threads';
import type { SSRManifest } from 'astro';
import { NodeApp } from 'astro/app/node';
import { startWorker } from './lib/publication/worker.ts';
import type { Task } from './lib/publication/tasks.ts';
import { type ServeOptions, type Served, serveSite } from './lib/serving/serve.ts';

/**
 * The built entry (astro.config.mjs puts it in the adapter's place): `serve` runs the product in this process,
 * `work` does one task in a worker thread of it.
 */
export function createExports(manifest: SSRManifest) {
  const app = new NodeApp(manifest);
  const entry = entryFile();
  let worker: ReturnType<typeof startWorker> | undefined;
  return {
    serve: (options: ServeOptions): Promise<Served> => serveSite(app, entry, options),
    work: (task: Task): Promise<unknown> => {
      worker ??= startWorker(app, threadData);
      return worker(task);
    },
  };
}

/** The built entry's own file; this code may stand in a chunk below it. */
function entryFile(): string {
  for (let folder = dirname(fileURLToPath(import.meta.url)); ; folder = dirname(folder)) {
    const file = join(folder, 'entry.mjs');
    if (existsSync(file)) return file;
    if (folder === dirname(folder))
      throw new Error('The built entry is missing: run npm run build');
  }
}
