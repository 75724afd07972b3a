import { createHash } from 'node:crypto';
import idle from 'astro/runtime/client/idle.prebuilt.js';
import load from 'astro/runtime/client/load.prebuilt.js';
import media from 'astro/runtime/client/media.prebuilt.js';
import only from 'astro/runtime/client/only.prebuilt.js';
import visible from 'astro/runtime/client/visible.prebuilt.js';
import island from 'astro/runtime/server/astro-island.prebuilt.js';

/** The only inline scripts of a built page: Astro's own, that start its islands. Everything else is a file. */
const inlineScripts = [idle, load, media, only, visible, island].map(
  (script) => `'sha256-${createHash('sha256').update(script).digest('base64')}'`,
);

/**
 * Scripts come from this site's files, and inline ones only if they are Astro's, known by their hashes. Styles
 * may be inline, because islands and drawings carry style attributes. Drawings are downloaded and
 * shown through blob: and data: addresses.
 */
const CONTENT_SECURITY_POLICY = [
  "default-src 'self'",
  `script-src 'self' ${inlineScripts.join(' ')}`,
  "style-src 'self' 'unsafe-inline'",
  "img-src 'self' data: blob:",
  "font-src 'self' data:",
  "worker-src 'self' blob:",
  "object-src 'none'",
  "base-uri 'none'",
  "form-action 'self'",
  "frame-ancestors 'none'",
].join('; ');

/** In development Vite's own inline scripts and its socket need what the policy refuses. */
export const addSecurityHeaders = (headers: Headers, development: boolean, tls: boolean): void => {
  headers.set(
    'content-security-policy',
    development ? "frame-ancestors 'none'" : CONTENT_SECURITY_POLICY,
  );
  headers.set('x-content-type-options', 'nosniff');
  headers.set('x-frame-options', 'DENY');
  headers.set('referrer-policy', 'same-origin');
  headers.set('cross-origin-opener-policy', 'same-origin');
  headers.set('permissions-policy', 'camera=(), geolocation=(), microphone=()');
  if (tls) headers.set('strict-transport-security', 'max-age=31536000');
};
