import type { LayoutDocument } from '@/paving/layout-document';
import { layFloor } from '@/paving/laying';
import { floorReport } from '@/paving/report';
import { formatWorkedVolume } from '@/takeoff/measures';
import { takeOff } from '@/takeoff/take-off';
import { PLAIN_AGGREGATE } from '../ui/drawing-colours';
import { SLOPING_COURT } from './level-pictures';

/** One thing that the guide's court takes: its volume as it lies and loose, and what is ordered for it. */
export interface OrderBar {
  readonly name: string;
  /** Shares of the greatest volume, per cent. */
  readonly loose: number;
  readonly inPlace: number;
  readonly words: string;
  readonly fill: string;
}

/** The court of the level map laid as a chequer, so that it has voids as well as a margin. */
const CHEQUER: LayoutDocument = {
  ...SLOPING_COURT,
  bond: { kind: 'chequer', unit: SLOPING_COURT.units[0].id, joint: 5 },
  aggregate: { name: 'Grey chippings', colour: PLAIN_AGGREGATE },
  buildUp: { ...SLOPING_COURT.buildUp!, geotextile: false },
};

let made: readonly OrderBar[] | null = null;

/** Worked out once for as long as the server runs. */
export function orderBars(): readonly OrderBar[] {
  made ??= orderBarsOf(CHEQUER);
  return made;
}

function orderBarsOf(document: LayoutDocument): readonly OrderBar[] {
  const laying = layFloor(document);
  const { lines, orders } = takeOff(laying, floorReport(laying), null);
  const counted = lines.filter(({ volume }) => volume !== null);
  const most = Math.max(...counted.map(({ volume }) => volume!.loose));
  return counted.map(({ name, volume, orderId, group }) => {
    const order = orders.find((candidate) => candidate.id === orderId);
    const loose = formatWorkedVolume(volume!.loose, document.display);
    const shared = order && order.lines.length > 1 ? `, part of ${order.words}` : '';
    const alone = order && order.lines.length === 1 ? `: ${order.words}` : '';
    return {
      name,
      loose: (volume!.loose / most) * 100,
      inPlace: (volume!.inPlace / most) * 100,
      words: `${loose} loose${shared}${alone}`,
      fill: group === 'fill' ? PLAIN_AGGREGATE : 'var(--slate)',
    };
  });
}
