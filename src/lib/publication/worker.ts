import type { NodeApp } from 'astro/app/node';
import { join } from 'node:path';
import type { Env } from '../env.ts';
import { renderPage } from '../serving/render.ts';
import { type RuntimeParts, openRuntime } from '../serving/runtime.ts';
import { type Task, perform } from './tasks.ts';

/** What a thread is told when it starts. */
export interface WorkerData {
  env: Env;
  root: string;
}

/**
 * One worker thread: it draws with the same built site as the process that serves, over a small database pool
 * of its own.
 */
export function startWorker(app: NodeApp, data: WorkerData): (task: Task) => Promise<unknown> {
  let opening: Promise<RuntimeParts> | undefined;
  const opened = () =>
    (opening ??= openRuntime(data.env, { connections: 2 }).catch((error: unknown) => {
      // The next task tries again: the database may only have been away.
      opening = undefined;
      throw error;
    }));
  return (task) =>
    perform(task, {
      fonts: join(data.root, 'node_modules', '@fontsource'),
      render: async (address, view) => renderPage(app, (await opened()).runtime, address, view),
    });
}
