import { fileURLToPath } from 'node:url';
import { defineConfig } from 'astro/config';
import node from '@astrojs/node';
import react from '@astrojs/react';
import tailwindcss from '@tailwindcss/vite';
import { siteProgram } from './pwa.config';

// What Vite calls its own flags. A test runner sets them in the environment, and a build would take them for what it is built for.
for (const flag of ['DEV', 'PROD', 'MODE', 'SSR', 'BASE_URL']) delete process.env[flag];

export default defineConfig({
  output: 'server',
  adapter: node({ mode: 'standalone' }),
  // The middleware's own check of origins covers JSON too; Astro's takes every host for localhost.
  security: { checkOrigin: false },
  devToolbar: { enabled: false },
  integrations: [react(), ...siteProgram()],
  vite: {
    plugins: [tailwindcss()],
    // Without this list the first visit in development re-optimises and reloads the page.
    optimizeDeps: {
      include: [
        'react',
        'react-dom/client',
        'konva',
        'react-konva',
        'zustand',
        'zundo',
        'comlink',
        'polygon-clipping',
        'jspdf',
        'svg2pdf.js',
        'idb',
      ],
    },
    // Said here as well as in tsconfig.json: the build of workers does not read that.
    resolve: { alias: { '@': fileURLToPath(new URL('./src', import.meta.url)) } },
    worker: { format: 'es' },
    // Scripts stay files: the content security policy lets no inline script run but Astro's own.
    build: { assetsInlineLimit: 0 },
  },
});
