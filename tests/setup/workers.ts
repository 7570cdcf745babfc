import { compute } from '../../src/lib/econ/compute.ts';
import { type Task, perform } from '../../src/lib/publication/tasks.ts';
import type { Workers } from '../../src/lib/publication/workers.ts';

/**
 * Workers that compute as the product does, in this thread, and draw pages and images that hold their address or
 * title only; what a test needs otherwise it gives.
 */
export function plainWorkers(own: Partial<Workers> = {}): Workers {
  const parts = { fonts: '', render: () => Promise.reject(new Error('Nothing is rendered here')) };
  const run = <T>(task: Task) => perform(task, parts) as Promise<T>;
  return {
    page: async (address) => ({
      status: address === '/404/' ? 404 : 200,
      headers: { 'content-type': 'text/html; charset=utf-8' },
      body: new TextEncoder().encode(address),
    }),
    shareImage: async ({ title }) => ({
      svg: `<svg xmlns="http://www.w3.org/2000/svg"><title>${title}</title></svg>`,
      png: new Uint8Array([0x89, 0x50, 0x4e, 0x47]),
      alt: title,
      caption: title,
    }),
    // Without the pool's crossing of threads a refusal must be thrown here.
    compute: async (request) => compute(request),
    examine: (request, result, released) => run({ kind: 'examine', request, result, released }),
    compress: (bytes) => run({ kind: 'compress', bytes }),
    close: async () => {},
    ...own,
  };
}
