import type { VersionDetail } from '@/api-types/versions';
import { formatArea } from '@/paving/area';
import { formatLength, formatSize } from '@/paving/length';
import { aggregateArea } from '@/paving/report';
import { formatCount } from '@/paving/count';

/** A figure for somebody who does not lay floors: what it is, and what it means for them. */
export interface PlainFigure {
  readonly name: string;
  readonly value: string;
  readonly meaning: string;
}

/** Less than this is the noise of adding up, m². */
const LEAST_SEEN_M2 = 1e-6;

type Shown = Pick<VersionDetail, 'document' | 'report'>;

/** The figures that a client decides by, in plain words. */
export function plainFigures({ document, report }: Shown): readonly PlainFigure[] {
  const { display } = document;
  const length = (mm: number) => formatLength(mm, display);
  const laid = document.units.filter((unit) => (report.byUnit[unit.id] ?? 0) > 0);
  const fill = document.aggregate?.name ?? 'Loose fill';
  const covered = report.coveredArea + (report.cut?.area ?? 0);
  const share = report.groundArea > 0 ? Math.round((100 * covered) / report.groundArea) : 0;
  return [
    ...laid.map((unit) => ({
      name: unit.name,
      value: formatCount(report.byUnit[unit.id]),
      meaning: `${formatSize(unit.length, unit.width, display)}, ${document.cutting === 'edge' ? 'laid whole; only those at the edge are cut.' : 'each laid whole: none is cut.'}`,
    })),
    {
      name: 'Floor',
      value: formatArea(report.groundArea, display),
      meaning: `Paving covers ${formatArea(covered, display)} of it, about ${share} per cent.`,
    },
    ...(report.cut
      ? [
          {
            name: 'Cut pieces',
            value: formatCount(report.cut.count),
            meaning: `Sawn to the edge from ${formatCount(report.cut.wholeUnits)} further units.`,
          },
        ]
      : []),
    ...(aggregateArea(report) > LEAST_SEEN_M2
      ? [
          {
            name: fill,
            value: formatArea(aggregateArea(report), display),
            meaning: report.cut
              ? 'What you see of it between the pieces.'
              : 'What you see of it between the pieces and all round the edge.',
          },
        ]
      : []),
    ...(report.leastGap === null
      ? []
      : [
          {
            name: 'Nearest to the edge',
            value: length(report.leastGap),
            meaning: report.cut
              ? 'No uncut piece comes closer to the edge than this.'
              : 'No piece comes closer to the edge than this.',
          },
        ]),
    ...(report.play === null
      ? []
      : [
          {
            name: 'Room to drift',
            value: length(Math.max(0, report.play)),
            meaning: `Floors drift a little while they are laid. This one may drift so far, and still ${report.cut ? 'no whole one' : 'nothing'} must be cut.`,
          },
        ]),
  ];
}

/** What a client should know before saying yes; never more than applies to this floor. */
export function clientCautions({ document, report }: Shown): readonly string[] {
  return [
    ...(aggregateArea(report) > LEAST_SEEN_M2
      ? [
          `With ${document.aggregate?.name.toLowerCase() ?? 'loose fill'} between the pieces the floor is not step-free for wheels or sticks.`,
        ]
      : []),
    'It is a floor for feet, not for vehicles, unless it is designed for them.',
    'Real paving differs a little in colour and size from the picture.',
  ];
}
