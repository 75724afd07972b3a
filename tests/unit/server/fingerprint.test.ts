import { createHash } from 'node:crypto';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { canonicalJson, fingerprintOf } from '@/server/fingerprint';

// Source: RFC 8785, section 3.2.2, the sample object and, in 3.2.3, how it reads canonicalised.
test('the sample of RFC 8785 reads as the RFC prints it', () => {
  const sample = JSON.parse(String.raw`{
    "numbers": [333333333.33333329, 1E30, 4.50, 2e-3, 0.000000000000000000000000001],
    "string": "\u20ac$\u000F\u000aA'\u0042\u0022\u005c\\\"\/",
    "literals": [null, true, false]
  }`);
  expect(canonicalJson(sample)).toBe(
    String.raw`{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],` +
      String.raw`"string":"€$\u000f\nA'B\"\\\\\"/"}`,
  );
});

// Source: RFC 8785, section 3.2.3, the test data for sorting and the order expected.
test('names are sorted by UTF-16 code units, as in the RFC’s own test data', () => {
  const sample = JSON.parse(String.raw`{
    "\u20ac": "Euro Sign", "\r": "Carriage Return", "\ufb33": "Hebrew Letter Dalet With Dagesh",
    "1": "One", "\ud83d\ude00": "Emoji: Grinning Face", "\u0080": "Control",
    "\u00f6": "Latin Small Letter O With Diaeresis"
  }`);
  const order = [...canonicalJson(sample).matchAll(/:"([^"]*)"/g)].map(([, value]) => value);
  expect(order).toEqual([
    'Carriage Return',
    'One',
    'Control',
    'Latin Small Letter O With Diaeresis',
    'Euro Sign',
    'Emoji: Grinning Face',
    'Hebrew Letter Dalet With Dagesh',
  ]);
});

test('the canonical form says the same and does not depend on the order of members', () => {
  fc.assert(
    fc.property(fc.jsonValue(), (value) => {
      const text = canonicalJson(value);
      expect(JSON.parse(text)).toEqual(JSON.parse(JSON.stringify(value)));
      expect(canonicalJson(JSON.parse(text))).toBe(text);
      if (value && typeof value === 'object' && !Array.isArray(value)) {
        expect(canonicalJson(Object.fromEntries(Object.entries(value).reverse()))).toBe(text);
      }
    }),
  );
});

test('the fingerprint is the SHA-256 of the canonical form', () => {
  expect(fingerprintOf({ b: 1, a: [2] })).toBe(
    createHash('sha256').update('{"a":[2],"b":1}').digest('hex'),
  );
});
