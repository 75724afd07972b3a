import { formatCount } from '@/paving/count';
import type { CutFigures } from '@/paving/cutting/cut-report';
import type { LayoutDocument } from '@/paving/layout-document';
import { formatLength } from '@/paving/length';
import { VIBRATION_ACTION, VIBRATION_LIMIT, vibrationHours, type SawTerms } from './cutting-cost';
import { formatHours } from './saw-time';

/** Something to know before a saw is switched on, or about a piece. */
export interface CuttingCaution {
  readonly id: 'dust' | 'vibration' | 'small' | 'narrow' | 'notched' | 'failed';
  /** `wrong` should not be laid so; `look` needs a decision; `caution` is for people's safety. */
  readonly weight: 'wrong' | 'look' | 'caution';
  readonly words: string;
  readonly source: string;
}

const CMHA =
  'ICPI (now CMHA), Construction Tolerances and Recommendations for Interlocking Concrete Pavements';

const pieces = (count: number): string =>
  count === 1 ? '1 piece' : `${formatCount(count)} pieces`;

/** What a floor's pieces and its saw call for. Law differs from place to place: each sentence says whose it is. */
export function cuttingCautions(
  { buildUp, display }: Pick<LayoutDocument, 'buildUp' | 'display'>,
  cut: CutFigures,
  { vibration }: Pick<SawTerms, 'vibration'>,
): CuttingCaution[] {
  if (cut.count === 0) return [];
  const vehicles = buildUp?.use === 'driveway';
  const narrow = formatLength(10, display, { decimals: 1 });
  const action = vibrationHours(vibration, VIBRATION_ACTION);
  const limit = vibrationHours(vibration, VIBRATION_LIMIT);
  return [
    {
      id: 'dust',
      weight: 'caution',
      words:
        'Dust from stone and concrete holds silica, which scars lungs. Cut wet, with water fed to the blade all the time, out of doors, and away from others. With a handheld saw for over 4 hours a day a respirator is needed as well; indoors always. Never cut dry without extraction. Your own country’s rules come first.',
      source: 'OSHA, 29 CFR 1926.1153, table 1 (i), (ii)',
    },
    ...(vibration > 0
      ? [
          {
            id: 'vibration' as const,
            weight: 'caution' as const,
            words: `A handheld saw of ${vibration} m/s² reaches the day’s action value for hands and arms after ${formatHours(action)} and the limit after ${formatHours(limit)}, one person. Ask the maker for your saw’s own figure, and share the time.`,
            source: 'Directive 2002/44/EC, article 3: 2.5 and 5 m/s² over 8 hours',
          },
        ]
      : []),
    ...(cut.underThird > 0
      ? [
          {
            id: 'small' as const,
            weight: vehicles ? ('wrong' as const) : ('look' as const),
            words: vehicles
              ? `${pieces(cut.underThird)} smaller than a third of a unit. Under wheels such pieces work loose: move the start, or leave them to aggregate.`
              : `${pieces(cut.underThird)} smaller than a third of a unit. On foot that is allowed, but such pieces show, and work loose first; under wheels it is not.`,
            source: CMHA,
          },
        ]
      : []),
    ...(cut.narrow > 0
      ? [
          {
            id: 'narrow' as const,
            weight: 'wrong' as const,
            words: `${pieces(cut.narrow)} narrower than ${narrow}: too narrow to lay. Move the start, or leave them to aggregate.`,
            source: CMHA,
          },
        ]
      : []),
    ...(cut.notched > 0
      ? [
          {
            id: 'notched' as const,
            weight: 'look' as const,
            words: `${pieces(cut.notched)} cut round an inner corner or a curve: slow to saw, and apt to break from the notch.`,
            source: 'common practice',
          },
        ]
      : []),
    ...(cut.failed.length > 0
      ? [
          {
            id: 'failed' as const,
            weight: 'look' as const,
            words: `${formatCount(cut.failed.length)} of the units at the edge could not be worked out and are left to aggregate here. Slide the pattern a little and they usually can.`,
            source: 'worked out here',
          },
        ]
      : []),
  ];
}
