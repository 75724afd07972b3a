import AstroPwa from '@vite-pwa/astro';
import type { Plugin } from 'vite';

/**
 * The phone's program: /site and what it is made of are kept by the browser, so that it opens without signal. The worker's
 * scope is /site alone: it has no say over signing in or over any other page. It keeps no answer of
 * the API; what belongs to a person is in the phone's store, see `src/components/site`.
 */

/** Where the phone's program starts, and what starts it, as Astro names its entries. */
const ENTRIES = [
  /\/src\/components\/site\/SiteApp(\.tsx)?$/,
  /\/@astrojs\/react\/dist\/client\.js$/,
];

/** Besides scripts: the styles, the letters of Latin, and the page's own few files. */
const BESIDES = [
  /^_astro\/[^/]+\.css$/,
  /^_astro\/nunito-sans-latin(-ext)?-(400|600|700)-normal\.[^/]+\.woff2$/,
  /^(theme\.js|held-presses\.js|favicon\.svg|icon-\d+\.png)$/,
];

/** Files that the phone's program can come to need, whichever of its parts is opened. */
const reached = new Set<string>();

/** Follows the imports of the phone's program through the built scripts. */
const followImports = (): Plugin => ({
  name: 'site-program',
  generateBundle(_options, bundle) {
    const follow = (file: string) => {
      const chunk = bundle[file];
      if (reached.has(file) || chunk?.type !== 'chunk') return;
      reached.add(file);
      for (const next of [...chunk.imports, ...chunk.dynamicImports]) follow(next);
    };
    for (const [file, chunk] of Object.entries(bundle)) {
      if (chunk.type !== 'chunk' || !chunk.facadeModuleId) continue;
      if (ENTRIES.some((entry) => entry.test(chunk.facadeModuleId!))) follow(file);
    }
  },
});

/** Without these the program would not start where there is no signal, and nobody would know before. */
const LEAST = [/^_astro\/SiteApp\./, /^_astro\/client\./, /\.css$/, /\.woff2$/];

const isKept = (url: string): boolean =>
  url === '/site' || reached.has(url) || BESIDES.some((kind) => kind.test(url));

export const siteProgram = () => [
  {
    name: 'site-program',
    hooks: {
      'astro:config:setup': ({
        updateConfig,
      }: {
        updateConfig: (config: { vite: { plugins: Plugin[] } }) => void;
      }) => updateConfig({ vite: { plugins: [followImports()] } }),
    },
  },
  AstroPwa({
    filename: 'site-worker.js',
    manifestFilename: 'site.webmanifest',
    scope: '/site',
    injectRegister: false,
    // A newer program waits until the person takes it: nothing half typed is lost to a page that loads itself anew.
    registerType: 'prompt',
    manifest: {
      name: 'Evenlay on site',
      short_name: 'Evenlay',
      description: 'Plans to build from, kept on the phone.',
      lang: 'en-GB',
      start_url: '/site',
      scope: '/site',
      display: 'standalone',
      background_color: '#f6f6f3',
      theme_color: '#f6f6f3',
      icons: [
        { src: '/icon-192.png', sizes: '192x192', type: 'image/png' },
        { src: '/icon-512.png', sizes: '512x512', type: 'image/png' },
      ],
    },
    workbox: {
      globPatterns: ['**/*.{js,css,woff2,svg,png}'],
      // The page is drawn by the server, so it is fetched when the program is kept, once for each build.
      additionalManifestEntries: [{ url: '/site', revision: Date.now().toString(36) }],
      manifestTransforms: [
        async (entries) => {
          const manifest = entries.filter(({ url }) => isKept(url));
          for (const least of LEAST) {
            if (!manifest.some(({ url }) => least.test(url))) {
              throw new Error(`The phone's program lacks ${String(least)}`);
            }
          }
          return { manifest, warnings: [] };
        },
      ],
      navigateFallback: '/site',
      navigateFallbackAllowlist: [/^\/site(\/[A-Za-z0-9_-]+)?\/?$/],
      directoryIndex: null,
      clientsClaim: true,
      cleanupOutdatedCaches: true,
      inlineWorkboxRuntime: true,
      sourcemap: false,
    },
  }),
];
