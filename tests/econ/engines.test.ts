import { readdirSync, readFileSync } from 'node:fs';
import { Worker } from 'node:worker_threads';
import { beforeAll, describe, expect, test } from 'vitest';
import { compute } from '../../src/lib/econ/compute.ts';
import type { ComputeRequest } from '../../src/lib/econ/types.ts';
import { startBrowser } from '../setup/browser.ts';
import { econScript } from '../setup/econScript.ts';

const folder = new URL('../reference/cases/', import.meta.url);
const requests = readdirSync(folder)
  .map((file) => JSON.parse(readFileSync(new URL(file, folder), 'utf8')))
  .filter((one) => !('errors' in one.expected))
  .map((one) => one.request as ComputeRequest);

describe('the same requests give the same bytes', { timeout: 120_000 }, () => {
  const inNode = requests.map((request) => JSON.stringify(compute(request)));
  let script = '';
  beforeAll(async () => {
    script = await econScript();
  }, 120_000);

  test('in a worker thread', async () => {
    const code = `${script}
      const { parentPort, workerData } = require('node:worker_threads');
      parentPort.postMessage(workerData.map((request) => JSON.stringify(econ.compute(request))));`;
    const worker = new Worker(code, { eval: true, workerData: requests });
    const inWorker = await new Promise((resolve, reject) => {
      worker.once('message', resolve);
      worker.once('error', reject);
    });
    await worker.terminate();
    expect(inWorker).toEqual(inNode);
  });

  test('in Chromium', async () => {
    const browser = await startBrowser();
    try {
      const page = await browser.open();
      await page.addScriptTag({ content: script });
      const inChromium = await page.evaluate((all) => {
        const { econ } = globalThis as unknown as { econ: { compute(request: unknown): unknown } };
        return all.map((request) => JSON.stringify(econ.compute(request)));
      }, requests);
      expect(inChromium).toEqual(inNode);
    } finally {
      await browser.close();
    }
  });
});
