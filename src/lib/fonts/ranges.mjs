/**
 * Reads a CSS unicode-range such as `U+0000-00FF,U+0131` as code points.
 * @param {string} range
 * @returns {number[]}
 */
export function codePoints(range) {
  return range.split(',').flatMap((part) => {
    const [first = '0', last = first] = part.trim().replace(/^U\+/, '').split('-');
    const from = Number.parseInt(first, 16);
    const length = Number.parseInt(last, 16) - from + 1;
    return Array.from({ length }, (_, i) => from + i);
  });
}

/**
 * Writes code points as a CSS unicode-range, neighbours joined.
 * @param {Iterable<number>} points
 * @returns {string}
 */
export function unicodeRange(points) {
  /** @type {[number, number][]} */
  const runs = [];
  for (const point of [...new Set(points)].sort((a, b) => a - b)) {
    const run = runs.at(-1);
    if (run && run[1] === point - 1) run[1] = point;
    else runs.push([point, point]);
  }
  const hex = (/** @type {number} */ point) => point.toString(16).toUpperCase();
  return runs.map(([a, b]) => (a === b ? `U+${hex(a)}` : `U+${hex(a)}-${hex(b)}`)).join(',');
}
