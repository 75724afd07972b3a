import type { VersionDetail } from '@/api-types/versions';
import { formatArea } from '@/paving/area';
import { formatLength, formatSize } from '@/paving/length';
import { countText } from '@/sheets/figures';

/** A figure for somebody who does not lay floors: what it is, and what it means for them. */
export interface PlainFigure {
  readonly name: string;
  readonly value: string;
  readonly meaning: string;
}

type Shown = Pick<VersionDetail, 'document' | 'report'>;

/** The figures that a client decides by, in plain words. */
export function plainFigures({ document, report }: Shown): readonly PlainFigure[] {
  const { display } = document;
  const length = (mm: number) => formatLength(mm, display);
  const laid = document.units.filter((unit) => (report.byUnit[unit.id] ?? 0) > 0);
  const fill = document.aggregate?.name ?? 'Loose fill';
  const share =
    report.groundArea > 0 ? Math.round((100 * report.coveredArea) / report.groundArea) : 0;
  return [
    ...laid.map((unit) => ({
      name: unit.name,
      value: countText(report.byUnit[unit.id]),
      meaning: `${formatSize(unit.length, unit.width, display)}, ${document.cutting === 'edge' ? 'laid whole; only those at the edge are cut.' : 'each laid whole: none is cut.'}`,
    })),
    {
      name: 'Floor',
      value: formatArea(report.groundArea, display),
      meaning: `Paving covers ${formatArea(report.coveredArea, display)} of it, about ${share} per cent.`,
    },
    ...(report.fillArea > 0
      ? [
          {
            name: fill,
            value: formatArea(report.fillArea, display),
            meaning: 'What you see of it between the pieces and all round the edge.',
          },
        ]
      : []),
    ...(report.leastGap === null
      ? []
      : [
          {
            name: 'Nearest to the edge',
            value: length(report.leastGap),
            meaning: 'No piece comes closer to the edge than this.',
          },
        ]),
    ...(report.play === null
      ? []
      : [
          {
            name: 'Room to drift',
            value: length(Math.max(0, report.play)),
            meaning:
              'Floors drift a little while they are laid. This one may drift so far, and still nothing must be cut.',
          },
        ]),
  ];
}

/** What a client should know before saying yes; never more than applies to this floor. */
export function clientCautions({ document, report }: Shown): readonly string[] {
  return [
    ...(report.fillArea > 0
      ? [
          `With ${document.aggregate?.name.toLowerCase() ?? 'loose fill'} between the pieces the floor is not step-free for wheels or sticks.`,
        ]
      : []),
    'It is a floor for feet, not for vehicles, unless it is designed for them.',
    'Real paving differs a little in colour and size from the picture.',
  ];
}
