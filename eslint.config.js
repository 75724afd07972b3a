import tseslint from 'typescript-eslint';
import astro from 'eslint-plugin-astro';

/**
 * Imports point one way: geometry ← paving ← takeoff ← sheets ← pdf ← server, components ← pages.
 * Each layer lists what it may not import; the core also takes no web, database or Node API.
 */
const web = [
  'react',
  'react-dom',
  'react-dom/*',
  'react-konva',
  'konva',
  'konva/*',
  'astro',
  'astro/*',
  'astro:*',
  'drizzle-orm',
  'drizzle-orm/*',
  'node:*',
  'fs',
  'path',
  'crypto',
  'zustand',
  'jspdf',
  'svg2pdf.js',
];
const layers = ['geometry', 'paving', 'takeoff', 'sheets', 'pdf', 'server', 'components', 'pages'];
const folders = (names) => names.flatMap((name) => [`@/${name}`, `@/${name}/*`, `**/${name}/**`]);
const forbid = (groups) => ({
  'no-restricted-imports': [
    'error',
    {
      patterns: groups.map(([group, message]) => ({ group, message })),
    },
  ],
});
const above = (layer) => layers.slice(layers.indexOf(layer) + 1);
const oneWay =
  'Imports point one way: geometry ← paving ← takeoff ← sheets ← pdf ← server, components ← pages.';
const core = (layer) => ({
  files: [`src/${layer}/**`],
  rules: {
    ...forbid([
      [web, 'The core knows nothing of the web, the database or Node.'],
      [folders([...above(layer), 'db']), oneWay],
    ]),
    'no-restricted-globals': ['error', 'window', 'document', 'process', 'localStorage', 'fetch'],
  },
});

export default tseslint.config(
  { ignores: ['dist/**', '.astro/**', 'data/**', 'node_modules/**'] },
  ...tseslint.configs.recommended,
  ...astro.configs.recommended,
  {
    rules: {
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_' },
      ],
      'no-console': 'error',
    },
  },
  { files: ['scripts/**', 'bench/**', 'tests/**'], rules: { 'no-console': 'off' } },
  core('geometry'),
  core('paving'),
  core('takeoff'),
  core('sheets'),
  {
    files: ['src/pdf/**'],
    rules: {
      ...forbid([
        [
          web.filter((name) => !['jspdf', 'svg2pdf.js'].includes(name)),
          'The PDF is made in browsers and in Node alike.',
        ],
        [folders([...above('pdf'), 'db']), oneWay],
      ]),
      'no-restricted-globals': ['error', 'window', 'document', 'process', 'DOMParser', 'fetch'],
    },
  },
  {
    files: ['src/components/**'],
    rules: forbid([
      [folders(['db', 'pages']), oneWay],
      [folders(['server']), 'The browser talks to the server through the API only.'],
    ]),
  },
  {
    files: ['src/pages/**', 'src/layouts/**'],
    rules: forbid([[folders(['db']), 'Only server/ imports db/.']]),
  },
  { files: ['src/server/**'], rules: forbid([[folders(['components', 'pages']), oneWay]]) },
  { files: ['src/db/**'], rules: forbid([[folders(['server', 'components', 'pages']), oneWay]]) },
);
