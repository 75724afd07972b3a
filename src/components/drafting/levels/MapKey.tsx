import { formatLength } from '@/paving/length';
import { documentLevels } from '@/paving/levels';
import { levelMapKey, mapKeySample } from '@/sheets/level-map-drawing';
import { SheetPicture } from '../../ui/SheetPicture';
import { earthOf } from '../earth';
import { useRestingFloor } from './use-resting-floor';

const SAMPLE = { left: 0.6, top: 0.6, right: 8.4, bottom: 4.4 };

/** What is on the level map. */
export function MapKey() {
  const floor = useRestingFloor();
  const earth = earthOf(floor);
  if (!earth) return null;
  const falls = documentLevels(floor.document).fall.kind !== 'none';
  const interval = formatLength(earth.map.interval, floor.document.display, { decimals: 1 });
  return (
    <section aria-label="Key of the level map">
      <ul className="space-y-1 text-sm">
        {levelMapKey(earth.model, earth.map, interval, falls).map(({ sample, text }) => (
          <li key={sample} className="flex items-center gap-3">
            <span className="w-9 shrink-0">
              <SheetPicture commands={mapKeySample(sample, SAMPLE)} width={9} height={5} label="" />
            </span>
            {text}
          </li>
        ))}
      </ul>
    </section>
  );
}
