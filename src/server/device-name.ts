/** The first that is found counts: browsers also name those that they resemble. */
const BROWSERS: readonly [RegExp, string][] = [
  [/\bEdgA?\//, 'Edge'],
  [/\bOPR\//, 'Opera'],
  [/\bSamsungBrowser\//, 'Samsung Internet'],
  [/\b(Firefox|FxiOS)\//, 'Firefox'],
  [/\b(Chrome|Chromium|CriOS|HeadlessChrome)\//, 'Chrome'],
  [/\bVersion\/.*\bSafari\//, 'Safari'],
];

const SYSTEMS: readonly [RegExp, string][] = [
  [/\biPhone\b/, 'iPhone'],
  [/\biPad\b/, 'iPad'],
  [/\bAndroid\b/, 'Android'],
  [/\bWindows\b/, 'Windows'],
  [/\bCrOS\b/, 'ChromeOS'],
  [/\bMac OS X\b|\bMacintosh\b/, 'a Mac'],
  [/\bLinux\b/, 'Linux'],
];

const firstOf = (table: readonly [RegExp, string][], userAgent: string): string | undefined =>
  table.find(([pattern]) => pattern.test(userAgent))?.[1];

/** A browser and its system in words, as well as its User-Agent tells. */
export const deviceName = (userAgent: string): string => {
  const browser = firstOf(BROWSERS, userAgent);
  const system = firstOf(SYSTEMS, userAgent);
  if (browser && system) return `${browser} on ${system}`;
  return browser ?? system ?? 'An unknown device';
};
