import { expect, it } from 'vitest';
import {
  KG_PER_POUND,
  KG_PER_SHORT_TON,
  M3_PER_CUBIC_FOOT,
  M3_PER_CUBIC_YARD,
  POUNDS_PER_CUBIC_FOOT,
  formatDensity,
  formatMass,
  formatRun,
  formatWorkedVolume,
} from '@/takeoff/measures';

// NIST SP 811, appendix B.8, as printed there: 1 ft³ = 2.831 685 E-02 m³, 1 yd³ = 7.645 549 E-01 m³,
// 1 lb = 4.535 924 E-01 kg, 1 short ton = 9.071 847 E+02 kg, 1 lb/ft³ = 1.601 846 E+01 kg/m³,
// 1 lb/yd³ = 5.932 764 E-01 kg/m³.
it('has the factors that NIST SP 811 B.8 prints', () => {
  const printed = (value: number, digits: number) => Number(value.toPrecision(digits));
  expect(printed(M3_PER_CUBIC_FOOT, 7)).toBe(2.831685e-2);
  expect(printed(M3_PER_CUBIC_YARD, 7)).toBe(7.645549e-1);
  expect(printed(KG_PER_POUND, 7)).toBe(4.535924e-1);
  expect(printed(KG_PER_SHORT_TON, 7)).toBe(9.071847e2);
  expect(printed(POUNDS_PER_CUBIC_FOOT, 7)).toBe(1.601846e1);
  expect(printed(KG_PER_POUND / M3_PER_CUBIC_YARD, 7)).toBe(5.932764e-1);
});

it('has them exactly, by the foot of 0.3048 m and the pound of 0.45359237 kg', () => {
  expect(M3_PER_CUBIC_FOOT).toBeCloseTo(0.3048 ** 3, 17);
  expect(M3_PER_CUBIC_YARD).toBeCloseTo(27 * M3_PER_CUBIC_FOOT, 15);
  expect(KG_PER_SHORT_TON).toBeCloseTo(2000 * KG_PER_POUND, 10);
});

// The same table: 1 m³ is 35.314 67 ft³ and 1.307 951 yd³; 1 t is 1.102 311 short tons, 2 204.623 lb.
it('prints what is a cubic metre and a tonne there in US measures', () => {
  expect(formatWorkedVolume(1, 'imperial')).toBe('35.31\u202fft³ (1.31\u202fyd³)');
  expect(formatWorkedVolume(0.1, 'imperial')).toBe('3.53\u202fft³');
  expect(formatWorkedVolume(12.345, 'metric')).toBe('12.35\u202fm³');
  expect(formatMass(1000, 'imperial')).toBe('1.10\u202fshort tons');
  expect(formatMass(24.25, 'metric')).toBe('24.3\u202fkg');
  expect(formatMass(2204.623 * KG_PER_POUND, 'metric')).toBe('1.00\u202ft');
  expect(formatRun(30.48, 'imperial')).toBe('100.0\u202fft');
});

// US EPA, Standard Volume-to-Weight Conversion Factors (2006): a cubic yard of crushed stone is
// 2 700 lb, so 100 lb/ft³, which is 1 602 kg/m³.
it('prints the density of the EPA’s cubic yard of crushed stone both ways', () => {
  const stone = (2700 * KG_PER_POUND) / M3_PER_CUBIC_YARD;
  expect(formatDensity(stone, 'imperial')).toBe('100.0\u202flb/ft³');
  expect(formatDensity(stone, 'metric')).toBe('1\u202f602\u202fkg/m³');
});
