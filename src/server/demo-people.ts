import type { Role } from '@/api-types/people';

/** Invented, like its people. */
export const DEMO_FIRM = 'Larkmoss Dry Floors';

/** For all of them: the demo is there to be walked into. */
export const DEMO_PASSWORD = 'laid-whole';

/** What the demo's client agrees to. */
export const DEMO_TERMS =
  'We lay the floor as drawn in the version you accept. Changes after that are agreed in writing first. ' +
  'Slabs vary in tone and by up to 2 mm in size; joints and margins take that up.';

/** Invented people, at addresses that can never exist (the domain `example`, RFC 2606). */
export const DEMO_PEOPLE: readonly { role: Role; name: string; email: string }[] = [
  { role: 'owner', name: 'Tamsin Okelby', email: 'owner@larkmoss.example' },
  { role: 'designer', name: 'Bram Festerley', email: 'designer@larkmoss.example' },
  { role: 'installer', name: 'Joss Winterpell', email: 'installer@larkmoss.example' },
  { role: 'client', name: 'Nerys Quillamore', email: 'client@larkmoss.example' },
];
