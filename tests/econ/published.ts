import { readFileSync } from 'node:fs';

// Values printed elsewhere, each with its source: tests/reference/published.json.
const file = new URL('../reference/published.json', import.meta.url);
const { entries } = JSON.parse(readFileSync(file, 'utf8')) as { entries: { id: string }[] };

/** The entry `id` of the published values. */
export function published<T>(id: string): T {
  const entry = entries.find((one) => one.id === id);
  if (entry === undefined) throw new Error(`published.json has no entry ${id}.`);
  return entry as T;
}

/** Columns of a data set of tests/reference/datasets by name; an empty cell is left out. */
export function dataset(name: string): Record<string, Float64Array> {
  const text = readFileSync(new URL(`../reference/datasets/${name}.csv`, import.meta.url), 'utf8');
  const [head, ...lines] = text.trim().split('\n');
  const rows = lines.map((line) => line.trim().split(','));
  return Object.fromEntries(
    head!
      .trim()
      .split(',')
      .map((column, j) => [
        column,
        Float64Array.from(
          rows.map((row) => row[j]!).filter((cell) => cell !== ''),
          Number,
        ),
      ]),
  );
}

/** How many leading digits of the expected values are right, in the worst of them. */
export function digits(got: ArrayLike<number>, expected: readonly number[]): number {
  return Math.min(
    ...expected.map((value, i) => {
      const error = Math.abs(got[i]! - value) / Math.abs(value);
      return error > 0 ? -Math.log10(error) : 16;
    }),
  );
}
