import { buildWhenStale } from '../../src/commands/build.mjs';

// As with the cluster: projects share nothing but the process.
const shared = globalThis as { slackwaterTestBuild?: Promise<void> };

/** The built site that servers of the tests run, made once a run where the sources have changed. */
export default async function setup(): Promise<void> {
  await (shared.slackwaterTestBuild ??= buildWhenStale());
}
