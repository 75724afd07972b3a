import { fileURLToPath } from 'node:url';
import { defineConfig, type TestProjectConfiguration } from 'vitest/config';
import { findPostgres, mayInstallPostgres } from './tests/postgres/binaries';

const node = {
  environment: 'node',
  setupFiles: ['tests/setup.node.ts'],
  testTimeout: 30_000,
  hookTimeout: 60_000,
  server: { deps: { inline: ['svg2pdf.js'] } },
};

/**
 * The API tests once more, on a PostgreSQL server. Where there is none and it cannot be installed they are left
 * out, said loudly; not in CI, where that fails.
 */
const onPostgres = (): TestProjectConfiguration[] => {
  if (!findPostgres() && !mayInstallPostgres() && !process.env.CI) {
    process.stderr.write(
      '\n*** PostgreSQL is not installed: THE API TESTS ON POSTGRESQL ARE LEFT OUT. ***\n' +
        '*** On Debian and Ubuntu: sudo apt-get install postgresql ***\n',
    );
    return [];
  }
  return [
    {
      extends: true,
      test: {
        ...node,
        name: 'postgres',
        include: ['tests/{api,postgres}/**/*.test.ts'],
        // About PGlite's folder.
        exclude: ['tests/api/processes.test.ts'],
        globalSetup: ['tests/postgres/global.ts'],
      },
    },
  ];
};

// Astro's own configuration is left out: nothing tested here is an Astro file, and the built server is
// driven by the browser tests. What a test needs of Astro is a module of the package.
export default defineConfig({
  resolve: {
    alias: {
      '@': fileURLToPath(new URL('./src', import.meta.url)),
      'astro:middleware': 'astro/middleware',
    },
  },
  esbuild: { jsx: 'automatic' },
  test: {
    projects: [
      {
        extends: true,
        test: {
          ...node,
          name: 'node',
          include: ['tests/{unit,checks,golden,api}/**/*.test.ts'],
          globalSetup: ['tests/postgres/none.ts'],
        },
      },
      ...onPostgres(),
      {
        extends: true,
        test: {
          name: 'dom',
          environment: 'jsdom',
          include: ['tests/unit/**/*.test.tsx'],
          setupFiles: ['tests/setup.dom.ts'],
        },
      },
      {
        extends: true,
        test: {
          name: 'e2e',
          environment: 'node',
          include: ['tests/e2e/**/*.e2e.ts'],
          globalSetup: ['tests/e2e/global.ts'],
          testTimeout: 120_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
