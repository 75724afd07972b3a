import { useEffect, useState } from 'react';
import { manySpots } from '../earth';
import type { Floor } from '../floor';
import { useSettledFloor, useShownFloor } from '../table-context';

/** How long a hand keeps still before figures of many spots are worked out, ms. */
const REST_MS = 150;

/**
 * The floor that figures are of: the one shown, or, where it has many spots and a hand is moving one, the one at which the hand
 * last kept still. So the map follows the hand, and the figures follow when it rests.
 */
export function useRestingFloor(): Floor {
  const shown = useShownFloor();
  const settled = useSettledFloor();
  const [rested, setRested] = useState({ floor: shown, from: settled });
  const waits = shown !== settled && manySpots(shown.document);
  useEffect(() => {
    if (!waits) return;
    const timer = setTimeout(() => setRested({ floor: shown, from: settled }), REST_MS);
    return () => clearTimeout(timer);
  }, [shown, settled, waits]);
  if (!waits) return shown;
  // Where the hand rested in another gesture is nothing of this one.
  return rested.from === settled ? rested.floor : settled;
}
