import { textWidth } from './textWidth.ts';
import type { TextWeight } from './textWidth.ts';

export const labelSize = 13;
export const valueSize = 17;

export interface Label {
  text: string;
  /** Where the anchor stands, in px. */
  x: number;
  /** Baseline, in px. */
  y: number;
  fill: string;
  anchor?: 'start' | 'middle' | 'end';
  size?: number;
  weight?: TextWeight;
  /** Colour of an outline that keeps the label legible over gridlines. */
  halo?: string;
}

export interface Box {
  left: number;
  right: number;
  top: number;
  bottom: number;
}

/** Baseline that centres figures and capitals of `size` px on `centre`. */
export function baselineAt(centre: number, size = labelSize): number {
  return centre + 0.33 * size;
}

/** The room a label takes, from its capitals' top to its descenders' end, in px. */
export function labelBox(label: Label): Box {
  const { text, x, y, anchor = 'start', size = labelSize, weight = 400 } = label;
  const width = textWidth(text, size, weight);
  const left = anchor === 'start' ? x : anchor === 'middle' ? x - width / 2 : x - width;
  return { left, right: left + width, top: y - 0.75 * size, bottom: y + 0.22 * size };
}

/** Whether two boxes come nearer than `gap` px to each other. */
export function overlap(a: Box, b: Box, gap = 0): boolean {
  return (
    a.left < b.right + gap &&
    b.left < a.right + gap &&
    a.top < b.bottom + gap &&
    b.top < a.bottom + gap
  );
}

/** Moves `positions` (px, any order) apart to at least `gap`, as little as possible, and keeps their order. */
export function spread(positions: number[], gap: number): number[] {
  const order = positions.map((_, i) => i).sort((a, b) => positions[a]! - positions[b]! || a - b);
  // Neighbours that are too near form a group that is centred on the mean of what they want.
  const groups: { members: number[]; start: number }[] = [];
  for (const member of order) {
    let group = { members: [member], start: positions[member]! };
    for (
      let last = groups.at(-1);
      last && last.start + last.members.length * gap > group.start;
      last = groups.at(-1)
    ) {
      groups.pop();
      const members = [...last.members, ...group.members];
      const wanted = members.reduce((sum, m, i) => sum + positions[m]! - i * gap, 0);
      group = { members, start: wanted / members.length };
    }
    groups.push(group);
  }
  const moved = [...positions];
  for (const { members, start } of groups) {
    members.forEach((member, i) => (moved[member] = start + i * gap));
  }
  return moved;
}
