import { builtinModules } from 'node:module';
import { createTypeScriptImportResolver } from 'eslint-import-resolver-typescript';
import astro from 'eslint-plugin-astro';
import { importX } from 'eslint-plugin-import-x';
import tseslint from 'typescript-eslint';

/** What a folder may not import: the arrows of DEVELOPERS.md, one row an arrow. */
const arrows = [
  {
    target: './src/lib/econ',
    from: ['./src', './db', './api', './seed', './tests'],
    except: ['./lib/econ'],
    message: 'econ is pure: it imports nothing of the project but itself.',
  },
  {
    target: './src/lib/charts',
    from: ['./src', './db', './api', './seed'],
    except: ['./lib/charts', './lib/econ'],
    message: 'charts run in the browser too: they import only econ and themselves.',
  },
  {
    target: './src/islands',
    from: ['./src', './db', './api', './seed'],
    except: ['./islands', './lib/charts', './lib/econ'],
    message: 'islands import only econ, charts and types.',
  },
  {
    target: './src/lib/images',
    from: ['./src', './db', './api', './seed'],
    except: ['./lib/images', './lib/charts', './lib/econ'],
    message: 'images draw what they are given: they import only charts and econ.',
  },
  {
    target: './db',
    from: ['./src', './api', './seed'],
    message: 'db is the lowest layer: services call it, never the other way round.',
  },
  {
    target: './src/lib/services',
    from: ['./api', './seed', './src/pages', './src/layouts', './src/components', './src/islands'],
    message: 'services know nothing of the surfaces that call them.',
  },
  {
    target: ['./src/pages', './src/layouts', './src/components'],
    from: './db',
    message: 'pages call services, never the database.',
  },
  {
    target: './api',
    from: ['./db', './src/pages', './src/components', './src/layouts'],
    message: 'the API calls services, never the database.',
  },
];

/** Mathematical functions whose last digit differs between engines (method, section 8). */
const exactMath = 'abs|sqrt|floor|ceil|min|max|sign';

export default tseslint.config(
  { ignores: ['dist/', '.astro/', 'node_modules/'] },
  ...tseslint.configs.recommended,
  ...astro.configs.recommended,
  {
    plugins: { 'import-x': importX },
    settings: { 'import-x/resolver-next': [createTypeScriptImportResolver()] },
    rules: {
      'import-x/no-restricted-paths': ['error', { zones: arrows }],
      'import-x/no-cycle': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
      'max-lines': ['error', { max: 400 }],
    },
  },
  {
    files: ['src/lib/econ/**/*.ts'],
    rules: {
      'no-restricted-imports': [
        'error',
        {
          patterns: [{ group: ['node:*'], message: 'econ runs in the browser.' }],
          paths: builtinModules.map((name) => ({ name, message: 'econ runs in the browser.' })),
        },
      ],
      'no-restricted-globals': ['error', 'process', 'Buffer', 'fetch', 'performance', 'Date'],
      'no-restricted-syntax': [
        'error',
        {
          selector: `MemberExpression[object.name='Math']:not([property.name=/^(${exactMath})$/])`,
          message: "Only Math's exact functions: the others differ between engines.",
        },
        {
          selector: "BinaryExpression[operator='**']",
          message: 'Powers come from @stdlib: ** differs between engines.',
        },
        {
          selector: "AssignmentExpression[operator='**=']",
          message: 'Powers come from @stdlib: ** differs between engines.',
        },
      ],
    },
  },
);
