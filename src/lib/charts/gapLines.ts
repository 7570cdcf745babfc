import type { Values } from '../econ/types.ts';
import type { Palette } from './palette.ts';

/** What the chart shows of a result: arrays over `periods`, in log points of output; null where no gap is published. */
export interface GapData {
  periods: string[];
  gap: Values | null;
  gap_lower: Values | null;
  gap_upper: Values | null;
}

export interface BandPoint {
  x: number;
  lower: number;
  upper: number;
  /** Points of one run are joined; a period without a value starts another. */
  run: number;
}

export interface LinePoint {
  x: number;
  value: number;
  stroke: string;
  /** Points of one piece are joined: a piece lies on one side of the datum. */
  piece: number;
}

/** The band's points, and the line cut where it crosses the datum; x counts periods, middles at .5. */
export function gapLines(
  { gap, gap_lower, gap_upper }: GapData,
  palette: Palette,
): { band: BandPoint[]; pieces: LinePoint[] } {
  const band: BandPoint[] = [];
  const pieces: LinePoint[] = [];
  let piece = 0;
  let run = 0;
  let before: LinePoint | null = null;
  for (const [i, value] of (gap ?? []).entries()) {
    const x = i + 0.5;
    const lower = gap_lower?.[i] ?? null;
    const upper = gap_upper?.[i] ?? null;
    if (lower === null || upper === null) run += 1;
    else band.push({ x, lower, upper, run });
    if (value === null) {
      piece += 1;
      before = null;
      continue;
    }
    const stroke = value >= 0 ? palette.above : palette.below;
    if (before !== null && before.stroke !== stroke) {
      const crossing = before.x + before.value / (before.value - value);
      pieces.push({ x: crossing, value: 0, stroke: before.stroke, piece });
      piece += 1;
      pieces.push({ x: crossing, value: 0, stroke, piece });
    }
    before = { x, value, stroke, piece };
    pieces.push(before);
  }
  return { band, pieces };
}
