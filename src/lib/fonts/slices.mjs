import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import subsetFont from 'subset-font';
import { basicCharacters, faces, keptFeatures } from './faces.mjs';
import { codePoints, unicodeRange } from './ranges.mjs';

const require = createRequire(import.meta.url);
const basic = new Set([...basicCharacters].map((character) => character.codePointAt(0) ?? 0));

/**
 * Cuts every shipped face into a basic slice, the rest of its Latin letters and further scripts, so that a page
 * in plain English loads only the first. The same input gives the same bytes.
 * @returns {Promise<{ css: string, files: Map<string, Buffer> }>}
 */
export async function cutFonts() {
  /** @type {Map<string, Buffer>} */
  const files = new Map();
  const rules = [];
  for (const face of faces) {
    const folder = `@fontsource/${face.package}`;
    const ranges = JSON.parse(await readFile(require.resolve(`${folder}/unicode.json`), 'utf8'));
    for (const script of face.scripts) {
      const shipped = await readFile(
        require.resolve(`${folder}/files/${face.package}-${script}-${face.weight}-normal.woff2`),
      );
      for (const slice of slicesOf(script, codePoints(ranges[script]))) {
        const name = `${face.package}-${face.weight}-${slice.name}.woff2`;
        const text = String.fromCodePoint(...slice.points);
        const bytes = await subsetFont(shipped, text, {
          targetFormat: 'woff2',
          keepFeatures: keptFeatures,
        });
        files.set(name, bytes);
        rules.push(faceRule(face, name, unicodeRange(slice.points)));
      }
    }
    rules.push(fallbackRule(face));
  }
  return { css: rules.join('\n'), files };
}

/** @param {string} script @param {number[]} points */
function slicesOf(script, points) {
  if (script !== 'latin') return [{ name: script, points }];
  return [
    { name: 'basic', points: [...basic] },
    { name: 'latin', points: points.filter((point) => !basic.has(point)) },
  ];
}

/** @param {(typeof faces)[number]} face @param {string} file @param {string} range */
function faceRule({ family, weight }, file, range) {
  return (
    `@font-face{font-family:'${family}';font-style:normal;font-weight:${weight};font-display:swap;` +
    `src:url('./${file}') format('woff2');unicode-range:${range}}`
  );
}

/** @param {(typeof faces)[number]} face */
function fallbackRule({ family, weight, ascent, descent, fallback, fallbackWidth }) {
  const percent = (/** @type {number} */ share) => `${(100 * share).toFixed(2)}%`;
  return (
    `@font-face{font-family:'${family} stand-in';font-style:normal;font-weight:${weight};` +
    `src:${fallback.map((name) => `local('${name}')`).join(',')};size-adjust:${percent(fallbackWidth)};` +
    `ascent-override:${percent(ascent / fallbackWidth)};descent-override:${percent(descent / fallbackWidth)};` +
    `line-gap-override:0%}`
  );
}
