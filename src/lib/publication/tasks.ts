import { brotliCompressSync, constants, gzipSync } from 'node:zlib';
import type { Fault } from '../econ/types.ts';
import { compute } from '../econ/compute.ts';
import { type ReleasedFigure, facts } from '../econ/facts.ts';
import { type RaceResult, race } from '../econ/race.ts';
import { RefusedError } from '../econ/refusal.ts';
import { type ShareImageInput, shareImage } from '../images/shareImage.ts';
import type { ComputeRequest, ComputeResult } from '../econ/types.ts';
import type { View } from '../services/view.ts';
import type { Examined, RenderedPage } from './workers.ts';

/** What is sent to a worker thread. */
export type Task =
  | { kind: 'page'; address: string; view: View }
  | { kind: 'shareImage'; input: ShareImageInput }
  | { kind: 'compute'; request: ComputeRequest }
  | {
      kind: 'examine';
      request: ComputeRequest;
      result: ComputeResult;
      released: ReleasedFigure[];
    }
  | { kind: 'compress'; bytes: Uint8Array };

/** A refusal crosses threads as data: an error would lose its faults on the way. */
export type Computed = { result: ComputeResult } | { faults: Fault[] };

/** Does a task in this thread; pages are drawn by `render`, which only the built site has. */
export async function perform(
  task: Task,
  parts: { fonts: string; render: (address: string, view: View) => Promise<RenderedPage> },
): Promise<unknown> {
  switch (task.kind) {
    case 'page':
      return parts.render(task.address, task.view);
    case 'shareImage':
      return shareImage(task.input, parts.fonts);
    case 'compute':
      return computed(task.request);
    case 'examine':
      return examined(task.request, task.result, task.released);
    case 'compress':
      return compressed(task.bytes);
  }
}

function computed(request: ComputeRequest): Computed {
  try {
    return { result: compute(request) };
  } catch (error) {
    if (error instanceof RefusedError) return { faults: error.faults };
    throw error;
  }
}

function examined(
  request: ComputeRequest,
  result: ComputeResult,
  released: ReleasedFigure[],
): Examined {
  return { facts: facts(result, released), race: raced(request) };
}

function raced(request: ComputeRequest): RaceResult | null {
  try {
    return race(request);
  } catch (error) {
    if (error instanceof RefusedError) return null;
    throw error;
  }
}

function compressed(bytes: Uint8Array): { br: Uint8Array; gzip: Uint8Array } {
  return {
    // Quality 5: higher ones cost many times more for a few per cent.
    br: brotliCompressSync(bytes, { params: { [constants.BROTLI_PARAM_QUALITY]: 5 } }),
    gzip: gzipSync(bytes, { level: 6 }),
  };
}
