import { mkdir, readFile, writeFile } from 'node:fs/promises';
import { fileURLToPath } from 'node:url';
import { cutFonts } from './slices.mjs';

/**
 * Cuts the fonts before a build or a development server starts, and lets pages import the outcome as
 * `slackwater-fonts/fonts.css` and `slackwater-fonts/<face>-<weight>-<slice>.woff2?url`.
 * @returns {import('astro').AstroIntegration}
 */
export function fonts() {
  return {
    name: 'slackwater-fonts',
    hooks: {
      'astro:config:setup': async ({ createCodegenDir, updateConfig }) => {
        const folder = createCodegenDir();
        await mkdir(folder, { recursive: true });
        const { css, files } = await cutFonts();
        for (const [name, bytes] of files) await writeWhereChanged(new URL(name, folder), bytes);
        await writeWhereChanged(new URL('fonts.css', folder), Buffer.from(css));
        updateConfig({
          vite: {
            resolve: { alias: { 'slackwater-fonts': fileURLToPath(folder).replace(/\/$/, '') } },
            // A font or script inside a page would need a content policy that allows data: or inline scripts.
            build: { assetsInlineLimit: 0 },
          },
        });
      },
    },
  };
}

/** @param {URL} file @param {Buffer} bytes */
async function writeWhereChanged(file, bytes) {
  const present = await readFile(file).catch(() => null);
  if (!present?.equals(bytes)) await writeFile(file, bytes);
}
