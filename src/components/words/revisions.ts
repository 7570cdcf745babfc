import { surpriseFigure } from '../../lib/charts/figures.ts';
import type { ComputeResult } from '../../lib/econ/types.ts';

type History = Pick<ComputeResult, 'periods' | 'surprise'>;

/** One period of the table of what was revised, in log points. */
export interface RevisedRow {
  period: string;
  first: number | null;
  before: number | null;
  now: number;
  /** Change against the release before; null where that has no value. */
  change: number | null;
  /** Whether the change can be seen in print. */
  isChanged: boolean;
}

export interface Revised {
  rows: RevisedRow[];
  /** Over the whole history that both releases have. */
  compared: number;
  changed: number;
  largest: RevisedRow | null;
  /** Changes that move a surprise to the other side of the datum. */
  signChanges: number;
}

/**
 * What a release revised: its history against that of the release before it and, by month, the values first
 * published. `rows` are the last `count` periods before the newest.
 */
export function revisedAgainst(
  now: History,
  before: History | null,
  first: { period: string; value: number | null }[],
  count = 6,
): Revised {
  const known = new Map<string, number>();
  before?.periods.forEach((period, i) => known.set(period, before.surprise[i]!));
  const firsts = new Map(first.map(({ period, value }) => [period, value]));
  const all = now.periods.map((period, i): RevisedRow => {
    const value = now.surprise[i]!;
    const earlier = known.get(period) ?? null;
    return {
      period,
      first: firsts.get(period) ?? null,
      before: earlier,
      now: value,
      change: earlier === null ? null : value - earlier,
      isChanged: earlier !== null && surpriseFigure(value) !== surpriseFigure(earlier),
    };
  });
  const compared = all.filter(({ before: value }) => value !== null);
  const changed = compared.filter(({ isChanged }) => isChanged);
  const bySize = [...changed].sort((a, b) => Math.abs(b.change!) - Math.abs(a.change!));
  const last = before?.periods.at(-1);
  const end = last ? all.findIndex(({ period }) => period === last) + 1 : all.length - 1;
  return {
    rows: all.slice(Math.max(0, end - count), Math.max(end, 0)),
    compared: compared.length,
    changed: changed.length,
    largest: bySize[0] ?? null,
    signChanges: changed.filter(({ now: a, before: b }) => Math.sign(a) * Math.sign(b!) < 0).length,
  };
}
