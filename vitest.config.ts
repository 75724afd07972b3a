import { getViteConfig } from 'astro/config';

export default getViteConfig({
  // @ts-expect-error Astro's type knows Vite's keys only; `test` is read by Vitest.
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
