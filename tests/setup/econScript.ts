import { fileURLToPath } from 'node:url';
import { build, type Rollup } from 'vite';

/** The computation as a browser gets it: one script that defines `econ.compute`. */
export async function econScript(): Promise<string> {
  const outputs = (await build({
    configFile: false,
    logLevel: 'error',
    build: {
      write: false,
      lib: {
        entry: fileURLToPath(new URL('../../src/lib/econ/compute.ts', import.meta.url)),
        formats: ['iife'],
        name: 'econ',
      },
    },
  })) as Rollup.RollupOutput[];
  return outputs[0]!.output[0].code;
}
