import { expect, it } from 'vitest';
import { M2_PER_SQUARE_FOOT, formatArea } from '@/paving/area';
import { MM_PER_FOOT, MM_PER_INCH, parseLength } from '@/paving/length';

// NIST SP 811, appendix B.8: 1 in = 25.4 mm and 1 ft = 0.3048 m exactly; 1 ft² = 9.290 304 E-02 m².
it('converts inches, feet and square feet by the exact factors of NIST SP 811 B.8', () => {
  expect(MM_PER_INCH).toBe(25.4);
  expect(MM_PER_FOOT).toBe(304.8);
  expect(M2_PER_SQUARE_FOOT).toBe(0.09290304);
  expect(M2_PER_SQUARE_FOOT).toBeCloseTo((MM_PER_FOOT / 1000) ** 2, 15);
  expect(parseLength(`1'`, 'metric')).toEqual({ ok: true, mm: 304.8 });
  // 1 in² = 6.4516 E-04 m² (the same table), and 144 of them are a square foot.
  expect(formatArea(6.4516e-4, 'metric')).toBe('0.000645\u202fm²');
  expect(formatArea(6.4516e-4, 'imperial')).toBe('0.00694\u202fft²');
  expect(formatArea(0.09290304, 'metric')).toBe('0.0929\u202fm²');
  expect(formatArea(0.09290304 * 100, 'imperial')).toBe('100.0\u202fft²');
});
