import { Piscina } from 'piscina';
import { RefusedError } from '../econ/refusal.ts';
import type { ShareImage } from '../images/shareImage.ts';
import type { Computed, Task } from './tasks.ts';
import { BusyError, type Examined, type RenderedPage, type Workers } from './workers.ts';

/** Computations that may wait; more would only wait longer than anybody does. */
const MOST_WAITING = 32;

/**
 * The worker threads of a process: some for drawing, and one for computing, so that no number of scenarios holds up
 * a release. `entry` is a module that exports `work(task)`; each thread gets `workerData`
 * and keeps what it opened between tasks.
 */
export function startPool(options: {
  entry: string;
  workerData: unknown;
  threads: number;
}): Workers {
  const common = { filename: options.entry, name: 'work', workerData: options.workerData };
  const drawing = new Piscina({ ...common, minThreads: 1, maxThreads: options.threads });
  const computing = new Piscina({
    ...common,
    minThreads: 0,
    maxThreads: 1,
    maxQueue: MOST_WAITING,
    idleTimeout: 60_000,
  });
  const run = (task: Task) => drawing.run(task) as Promise<unknown>;
  return {
    page: (address, view) => run({ kind: 'page', address, view }) as Promise<RenderedPage>,
    shareImage: (input) => run({ kind: 'shareImage', input }) as Promise<ShareImage>,
    async compute(request) {
      if (computing.queueSize >= MOST_WAITING) throw new BusyError();
      const answer = (await computing.run({ kind: 'compute', request })) as Computed;
      if ('faults' in answer) throw new RefusedError(answer.faults);
      return answer.result;
    },
    examine: (request, result, released) =>
      run({ kind: 'examine', request, result, released }) as Promise<Examined>,
    compress: (bytes) =>
      run({ kind: 'compress', bytes }) as Promise<{ br: Uint8Array; gzip: Uint8Array }>,
    async close() {
      await Promise.all([drawing.close(), computing.close()]);
    },
  };
}
