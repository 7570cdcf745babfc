// A server in a process of its own: told its environment by message, ended by a signal, or by the end of the test.
import { ENTRY } from '../../src/commands/build.mjs';

process.on('disconnect', () => process.exit(1));

process.once('message', async ({ env, seed }) => {
  try {
    const { serve } = await import(ENTRY);
    const served = await serve({ env, seed, onProgress: (text) => console.log(text) });
    process.once('SIGTERM', () => served.close().then(() => process.exit(0)));
    process.send({ url: served.url });
  } catch (error) {
    console.error(error);
    process.exit(1);
  }
});
