import js from '@eslint/js';
import astro from 'eslint-plugin-astro';
import boundaries from 'eslint-plugin-boundaries';
import hooks from 'eslint-plugin-react-hooks';
import jsxA11y from 'eslint-plugin-jsx-a11y';
import { defineConfig } from 'eslint/config';
import tseslint from 'typescript-eslint';

/** The whole architecture, as data: [folder, what it may import, where to put it instead]. */
const layers = [
  ['core', 'src/core', ['core'], 'core is pure: take the value as an argument'],
  ['contracts', 'src/contracts', ['contracts', 'core'], 'a contract is a schema: keep I/O in src/server'],
  ['config', 'src/server/config', ['config'], 'config reads process.env and nothing else'],
  [
    'db',
    'src/server/db',
    ['db', 'core', 'config'],
    'repositories return core values; let a service combine them',
  ],
  ['files', 'src/server/files', ['files', 'config'], 'files keep bytes; a service knows whose they are'],
  [
    'sheets',
    'src/server/sheets',
    ['sheets', 'core', 'config'],
    'sheets turn bytes into rows and back; a service stores them',
  ],
  [
    'mail',
    'src/server/mail',
    ['mail', 'core', 'config'],
    'mail renders what it is given; a service decides to send it',
  ],
  ['auth', 'src/server/auth', ['auth', 'db', 'core', 'config'], 'auth knows users and sessions only'],
  [
    'services',
    'src/server/services',
    ['services', 'auth', 'sheets', 'mail', 'files', 'db', 'contracts', 'core', 'config'],
    'a service never sees a Request: read it in src/server/http',
  ],
  [
    'http',
    'src/server/http',
    ['http', 'auth', 'contracts', 'core', 'config'],
    'http turns results into responses; call services from the route file',
  ],
  [
    'components',
    'src/components',
    ['components', 'contracts', 'core'],
    'islands get plain rows as props; ask a page or an API route',
  ],
  [
    'layouts',
    'src/layouts',
    ['layouts', 'components', 'contracts', 'core', 'styles'],
    'a layout draws; the page fetches',
  ],
  ['styles', 'src/styles', ['styles'], ''],
  [
    'pages',
    'src/pages',
    ['services', 'http', 'auth', 'contracts', 'core', 'components', 'layouts', 'styles'],
    'a page calls one service: move the query there',
  ],
  [
    'jobs',
    'jobs',
    ['jobs', 'services', 'sheets', 'http', 'db', 'config', 'contracts', 'core'],
    'a job calls one service',
  ],
  [
    'seeders',
    'seeders',
    ['seeders', 'services', 'sheets', 'auth', 'db', 'config', 'core'],
    'a seeder writes through services where it can',
  ],
];

const clock = [
  {
    selector: "NewExpression[callee.name='Date'][arguments.length=0]",
    message: 'take asOf or now as an argument: the clock is read in routes and jobs',
  },
  {
    selector: "CallExpression[callee.object.name='Date'][callee.property.name='now']",
    message: 'take now as an argument: the clock is read in routes and jobs',
  },
  {
    selector: "CallExpression[callee.object.name='Math'][callee.property.name='random']",
    message: 'take a seeded generator as an argument',
  },
];

export default defineConfig(
  { ignores: ['dist/**', '.astro/**', '.data/**', 'node_modules/**'] },
  js.configs.recommended,
  ...tseslint.configs.recommendedTypeChecked,
  {
    languageOptions: {
      parserOptions: {
        projectService: true,
        tsconfigRootDir: import.meta.dirname,
        extraFileExtensions: ['.astro'],
      },
    },
    rules: {
      '@typescript-eslint/switch-exhaustiveness-check': [
        'error',
        { considerDefaultExhaustiveForUnions: true },
      ],
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
      '@typescript-eslint/restrict-template-expressions': [
        'error',
        { allowNumber: true, allowBoolean: true },
      ],
    },
  },
  {
    files: ['**/*.tsx'],
    plugins: { 'react-hooks': hooks },
    rules: { ...jsxA11y.flatConfigs.recommended.rules, ...hooks.configs.recommended.rules },
  },
  ...astro.configs.recommended,
  ...astro.configs['jsx-a11y-recommended'],
  {
    files: ['**/*.astro', '**/*.astro/*.ts', '**/*.{js,mjs}'],
    extends: [tseslint.configs.disableTypeChecked],
  },
  {
    files: ['**/*.{js,mjs}'],
    languageOptions: {
      globals: {
        process: 'readonly',
        console: 'readonly',
        URL: 'readonly',
        performance: 'readonly',
        fetch: 'readonly',
        AbortController: 'readonly',
        AbortSignal: 'readonly',
        setTimeout: 'readonly',
        clearTimeout: 'readonly',
        setInterval: 'readonly',
        Buffer: 'readonly',
      },
    },
  },
  {
    files: ['src/core/**/*.ts', 'src/server/services/**/*.ts'],
    ignores: ['**/*.test.ts'],
    rules: { 'no-restricted-syntax': ['error', ...clock] },
  },
  {
    files: ['src/**/*.{ts,tsx,astro}', 'jobs/**/*.ts', 'seeders/**/*.ts'],
    ignores: ['**/*.test.ts', '**/*.test.tsx'],
    plugins: { boundaries },
    settings: {
      'boundaries/elements': layers.map(([type, pattern]) => ({ type, pattern, mode: 'folder' })),
      'import/resolver': { typescript: true },
    },
    rules: {
      'boundaries/element-types': [
        'error',
        {
          default: 'allow',
          rules: layers.flatMap(([from, , allow, hint]) => [
            { from, disallow: ['*'], message: `${from} may not import \${dependency.type}. ${hint}` },
            { from, allow },
          ]),
        },
      ],
      'boundaries/external': [
        'error',
        {
          default: 'allow',
          rules: [
            {
              from: 'core',
              disallow: ['*'],
              message: 'core may import only the pure numeric packages of tests/architecture',
            },
            { from: 'core', allow: ['decimal.js', 'ml-matrix', '@stdlib/stats-base-dists-*'] },
            {
              from: ['components', 'layouts', 'pages'],
              disallow: ['sequelize', 'exceljs', 'nodemailer'],
              message: 'reach it through a service',
            },
            {
              from: ['core', 'contracts', 'config', 'db', 'files', 'sheets', 'mail', 'auth', 'services'],
              disallow: ['astro', 'astro:*'],
              message: 'must also run in jobs/, outside Astro',
            },
          ],
        },
      ],
    },
  },
);
