import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

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
          name: 'node',
          environment: 'node',
          include: ['tests/{unit,checks,golden,api}/**/*.test.ts'],
          setupFiles: ['tests/setup.node.ts'],
          testTimeout: 30_000,
          hookTimeout: 60_000,
          server: { deps: { inline: ['svg2pdf.js'] } },
        },
      },
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
