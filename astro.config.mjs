import node from '@astrojs/node';
import tailwindcss from '@tailwindcss/vite';
import { defineConfig } from 'astro/config';
import { buildId } from './src/commands/sources.mjs';
import { fonts } from './src/lib/fonts/integration.mjs';

/**
 * The node adapter with our own server in its place, so that server, API and pages are one module graph with one
 * pool and one sign-in. The built entry exports `serve` (src/server.ts) and `work` (a worker thread's task).
 */
function slackwater() {
  const base = node({ mode: 'middleware' });
  return {
    ...base,
    name: 'slackwater',
    hooks: {
      ...base.hooks,
      'astro:config:done': (options) =>
        base.hooks['astro:config:done']({
          ...options,
          setAdapter: (adapter) =>
            options.setAdapter({
              ...adapter,
              name: 'slackwater',
              serverEntrypoint: './src/server.ts',
              exports: ['serve', 'work'],
            }),
        }),
    },
  };
}

export default defineConfig({
  output: 'server',
  trailingSlash: 'ignore',
  adapter: slackwater(),
  integrations: [fonts()],
  // Styles and scripts are files: the content policy allows nothing inline.
  build: { inlineStylesheets: 'never' },
  devToolbar: { enabled: false },
  vite: {
    plugins: [tailwindcss()],
    define: { __BUILD__: JSON.stringify(await buildId()) },
    build: { assetsInlineLimit: 0 },
    ssr: { external: ['@resvg/resvg-js', 'piscina', 'pg', 'better-auth', 'linkedom'] },
  },
});
