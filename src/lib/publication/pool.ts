import { Piscina } from 'piscina';
import { RefusedError } from '../econ/refusal.ts';
import type { ShareImage } from '../images/shareImage.ts';
import type { Computed, Task } from './tasks.ts';
import type { Examined, RenderedPage, Workers } from './workers.ts';

/**
 * The worker threads of a process. `entry` is a module that exports `work(task)`; each thread gets `workerData`
 * and keeps what it opened between tasks.
 */
export function startPool(options: {
  entry: string;
  workerData: unknown;
  threads: number;
}): Workers {
  const pool = new Piscina({
    filename: options.entry,
    name: 'work',
    workerData: options.workerData,
    minThreads: 1,
    maxThreads: options.threads,
    idleTimeout: 60_000,
  });
  const run = (task: Task) => pool.run(task) as Promise<unknown>;
  return {
    page: (address, view) => run({ kind: 'page', address, view }) as Promise<RenderedPage>,
    shareImage: (input) => run({ kind: 'shareImage', input }) as Promise<ShareImage>,
    async compute(request) {
      const answer = (await run({ kind: 'compute', request })) as Computed;
      if ('faults' in answer) throw new RefusedError(answer.faults);
      return answer.result;
    },
    examine: (request, result, released) =>
      run({ kind: 'examine', request, result, released }) as Promise<Examined>,
    compress: (bytes) =>
      run({ kind: 'compress', bytes }) as Promise<{ br: Uint8Array; gzip: Uint8Array }>,
    close: () => pool.close(),
  };
}
