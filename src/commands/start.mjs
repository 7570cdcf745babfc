import { checkNode, installPackages } from './install.mjs';
import { Progress } from './progress.mjs';
import { CommandError, ROOT } from './run.mjs';

const STOPPING = ['SIGINT', 'SIGTERM', 'SIGHUP'];
const PARENT_LOOK_MS = 250;

/** Sets everything up, runs the product in this process, and on a signal stops all it started. */
async function main() {
  const progress = new Progress();
  const broken = new AbortController();
  /** @type {(() => Promise<void>)[]} */
  const closers = [];
  let stopping;

  const stop = (code) => {
    stopping ??= (async () => {
      broken.abort();
      progress.broken();
      for (const close of closers.reverse()) await close().catch(complain);
      process.exit(code);
    })();
    return stopping;
  };
  for (const name of STOPPING) {
    process.on(name, () => {
      if (stopping) process.exit(1);
      console.log('\nStopping …');
      void stop(0);
    });
  }
  stopWhenNpmDies(() => stop(1));

  try {
    process.chdir(ROOT);
    process.env.NODE_ENV ??= 'production';
    checkNode();
    await installPackages(progress, broken.signal);
    const { register } = await import('tsx/esm/api');
    const unregister = register();
    const { serve } = await import('./serve.ts');
    await serve({ progress, signal: broken.signal, closers, onLoaded: unregister });
  } catch (error) {
    if (stopping) return stopping;
    progress.broken();
    complain(error);
    await stop(1);
  }
}

/** npm killed outright leaves us running with no one to stop us, on the port and the data directory. */
function stopWhenNpmDies(stop) {
  if (!process.env.npm_lifecycle_event) return;
  const parent = process.ppid;
  const timer = setInterval(() => {
    if (process.ppid !== parent) void stop();
  }, PARENT_LOOK_MS);
  timer.unref();
}

function complain(error) {
  if (error instanceof CommandError && error.output) console.error(`\n${error.output}\n`);
  console.error(error instanceof Error ? error.message : error);
}

await main();
