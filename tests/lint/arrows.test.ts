import { ESLint } from 'eslint';
import { beforeAll, describe, expect, test } from 'vitest';

let eslint: ESLint;
beforeAll(() => {
  eslint = new ESLint();
});

/** What the linter says of a text, were it a file at this path. */
async function complaints(filePath: string, text: string): Promise<string[]> {
  const [result] = await eslint.lintText(text, { filePath });
  return result!.messages.map(({ ruleId, message }) => `${ruleId}: ${message}`);
}

const imports = (from: string): string => `import '${from}';\n`;

/** A file, what it must not hold, and the words it is refused with. */
const broken: [name: string, file: string, text: string, words: RegExp][] = [
  ['econ importing db', 'src/lib/econ/x.ts', imports('../../../db/connection.ts'), /econ is pure/],
  [
    'econ importing a service',
    'src/lib/econ/x.ts',
    imports('../services/context.ts'),
    /econ is pure/,
  ],
  ['econ importing charts', 'src/lib/econ/x.ts', imports('../charts/figures.ts'), /econ is pure/],
  [
    'econ deep down importing db',
    'src/lib/econ/expectations/x.ts',
    imports('../../../../db/migrate.ts'),
    /econ is pure/,
  ],
  [
    'econ importing a Node built-in',
    'src/lib/econ/x.ts',
    imports('node:fs'),
    /runs in the browser/,
  ],
  [
    'econ importing a Node built-in by its bare name',
    'src/lib/econ/x.ts',
    imports('fs'),
    /runs in the browser/,
  ],
  [
    'econ importing a part of a Node built-in',
    'src/lib/econ/x.ts',
    imports('fs/promises'),
    /runs in the browser/,
  ],
  ['econ reading the clock', 'src/lib/econ/x.ts', 'export const t = Date.now();\n', /'Date'/],
  [
    'econ reading the environment',
    'src/lib/econ/x.ts',
    'export const e = process.env;\n',
    /'process'/,
  ],
  [
    'an inexact logarithm in econ',
    'src/lib/econ/x.ts',
    'export const l = Math.log(2);\n',
    /exact functions/,
  ],
  [
    'an inexact power in econ',
    'src/lib/econ/x.ts',
    'export const p = (a: number) => a ** 2;\n',
    /Powers/,
  ],
  [
    'charts importing a service',
    'src/lib/charts/x.ts',
    imports('../services/context.ts'),
    /charts run in the browser/,
  ],
  [
    'charts importing db',
    'src/lib/charts/x.ts',
    imports('../../../db/connection.ts'),
    /charts run in the browser/,
  ],
  [
    'images importing a service',
    'src/lib/images/x.ts',
    imports('../services/context.ts'),
    /images draw/,
  ],
  [
    'an island importing a service',
    'src/islands/x.tsx',
    imports('../lib/services/context.ts'),
    /islands import only/,
  ],
  [
    'an island importing db',
    'src/islands/x.tsx',
    imports('../../db/connection.ts'),
    /islands import only/,
  ],
  ['db importing a service', 'db/x.ts', imports('../src/lib/services/context.ts'), /lowest layer/],
  [
    'a query importing the clock',
    'db/queries/x.ts',
    imports('../../src/lib/clock.ts'),
    /lowest layer/,
  ],
  [
    'a service importing a page',
    'src/lib/services/x.ts',
    imports('../../pages/about/index.astro'),
    /know nothing of the surfaces/,
  ],
  [
    'a service importing the API',
    'src/lib/services/x.ts',
    imports('../../../api/app.ts'),
    /know nothing of the surfaces/,
  ],
  [
    'a page importing db',
    'src/pages/x.ts',
    imports('../../db/connection.ts'),
    /pages call services/,
  ],
  [
    'an Astro page importing db',
    'src/pages/x.astro',
    `---\n${imports('../../db/connection.ts')}---\n<p></p>\n`,
    /pages call services/,
  ],
  [
    'a component importing a query',
    'src/components/x.astro',
    `---\n${imports('../../db/queries/published.ts')}---\n<p></p>\n`,
    /pages call services/,
  ],
  ['the API importing db', 'api/x.ts', imports('../db/connection.ts'), /API calls services/],
  [
    'the API importing a query',
    'api/v1/economies/x.ts',
    imports('../../../db/queries/published.ts'),
    /API calls services/,
  ],
];

const allowed: [name: string, file: string, text: string][] = [
  ['econ importing itself', 'src/lib/econ/x.ts', imports('./periods.ts')],
  ['econ deep down importing itself', 'src/lib/econ/expectations/x.ts', imports('../periods.ts')],
  ['econ using exact functions', 'src/lib/econ/x.ts', 'export const r = Math.sqrt(Math.abs(2));\n'],
  ['charts importing econ', 'src/lib/charts/x.ts', imports('../econ/periods.ts')],
  ['an island importing econ', 'src/islands/x.tsx', imports('../lib/econ/periods.ts')],
  ['a service importing db', 'src/lib/services/x.ts', imports('../../../db/connection.ts')],
  ['a page importing a service', 'src/pages/x.ts', imports('../lib/services/context.ts')],
  ['the API importing a service', 'api/x.ts', imports('../src/lib/services/context.ts')],
];

describe('the linter', () => {
  test.each(broken)('refuses %s', async (_name, file, text, words) => {
    expect((await complaints(file, text)).join('\n')).toMatch(words);
  });

  test.each(allowed)('takes %s', async (_name, file, text) => {
    expect(await complaints(file, text)).toEqual([]);
  });
});
