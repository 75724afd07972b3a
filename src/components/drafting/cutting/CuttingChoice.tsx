import { useQuery } from '@tanstack/react-query';
import { memo, useMemo, useState } from 'react';
import { formatCount } from '@/paving/count';
import type { FirmPricing } from '@/api-types/pricing';
import type { LayoutDocument } from '@/paving/layout-document';
import { cuttingCautions } from '@/takeoff/cutting-cautions';
import { api } from '../../ui/api';
import { FloorDrawing } from '../../ui/FloorDrawing';
import { Segmented } from '../../ui/Segmented';
import { usePriceList } from '../takeoff/use-price-list';
import { useSettledFloor, useTableStore } from '../table-context';
import { CostTable } from './CostTable';
import { CautionList } from './CautionList';
import { SawFields } from './SawFields';
import { keepSawTerms, keptSawTerms } from './saw-terms';
import { useCutFloor } from './use-cut-floor';

const OPTIONS = [
  ['none', 'Whole only'],
  ['edge', 'Cut at edge'],
] as const;

const SAID: Readonly<Record<LayoutDocument['cutting'], string>> = {
  none: 'Every unit is laid whole; aggregate takes the rest.',
  edge: 'Units are cut at the edge.',
};

/**
 * The same start laid of whole units alone, or with its edge cut: what each comes to, and the choice. It is of the
 * floor as settled, so nothing of it is drawn anew while a hand is on the floor.
 */
export const CuttingChoice = memo(function CuttingChoice() {
  const table = useTableStore();
  const { document, laying } = useSettledFloor();
  const [terms, setTerms] = useState(keptSawTerms);
  const prices = usePriceList();
  const firm = useQuery({
    queryKey: ['firm-pricing'],
    queryFn: () => api<FirmPricing>('GET', '/api/firm/pricing'),
    staleTime: 60_000,
    retry: false,
  });
  // The firm's hour, until somebody types another here; nought says that it has none.
  const firmHour = firm.data?.labourHourMinor || null;
  const reckoned = useMemo(
    () => ({ ...terms, hourMinor: terms.hourMinor ?? firmHour }),
    [terms, firmHour],
  );
  const priced = prices.data && prices.data.items.length + (prices.data.typed?.length ?? 0) > 0;
  const list = priced ? prices.data! : null;
  const { floor, working, failure } = useCutFloor(laying ? document : null, list, reckoned);
  const both = useMemo(
    () => [
      { ...document, cutting: 'none' as const },
      { ...document, cutting: 'edge' as const },
    ],
    [document],
  );
  if (!laying) return null;
  const { cutting, display } = document;
  const choose = (next: LayoutDocument['cutting']) => {
    table.getState().edit((now) => (now.cutting === next ? now : { ...now, cutting: next }));
    table.getState().set({ said: SAID[next] });
  };
  return (
    <section aria-label="Whole, or cut at the edge" data-testid="cutting">
      <h3 className="mb-2 border-b border-graphite pb-1">Whole, or cut at the edge</h3>
      <Segmented
        label="At the edge"
        hideLabel
        value={cutting}
        options={OPTIONS}
        onChange={choose}
      />
      <div className="mt-3 grid grid-cols-2 gap-3 text-sm text-slate">
        {both.map((side) => (
          <figure key={side.cutting}>
            <FloorDrawing document={side} width={140} height={104} />
            <figcaption className="mt-1 text-center">
              {side.cutting === 'none' ? 'Whole units, aggregate at the edge' : 'Cut to the edge'}
            </figcaption>
          </figure>
        ))}
      </div>
      {failure && (
        <p role="alert" className="mt-2 text-brick">
          What cutting comes to could not be worked out: {failure} Your floor is kept as it is.
          Slide the pattern a little, or tell us.
        </p>
      )}
      {!floor && !failure && <p className="mt-3 min-h-48 text-slate">Cutting it to see …</p>}
      {floor && (
        <div
          className={`mt-3 space-y-4 ${working ? 'opacity-60' : ''}`}
          aria-busy={working}
          data-testid="cutting-figures"
        >
          <CostTable floor={floor} display={display} hourCurrency={firm.data?.currency ?? null} />
          {floor.cut.count === 0 ? (
            <p className="text-sm">
              Nothing to cut here: no unit at the edge leaves a piece wide enough to saw.
            </p>
          ) : (
            <>
              <p className="text-sm text-slate">
                {nestingWords(floor.cut.count, floor.cut.wholeUnits, floor.cut.leastUnits)} Pieces
                are sawn face up, a maker’s edge on a maker’s edge. The saw goes right through each
                unit; a cut that two pieces share counts once.
                {cutting === 'edge' &&
                  ' On the floor they are hatched, with the sawn edge dashed; a dot marks one smaller than a third of a unit, a cross one too narrow to lay. With Lift you can leave a piece out.'}
              </p>
              <CautionList cautions={cuttingCautions(document, floor.cut, terms)} />
              <SawFields
                terms={terms}
                display={display}
                currency={floor.comparison.currency ?? firm.data?.currency ?? null}
                firmHour={firmHour}
                onTerms={(next) => {
                  setTerms(next);
                  keepSawTerms(next);
                }}
              />
            </>
          )}
          <p className="text-sm text-slate">
            The best start is looked for whole units; cutting takes no part in it.
          </p>
        </div>
      )}
    </section>
  );
});

function nestingWords(pieces: number, units: number, least: number): string {
  const come = `${formatCount(pieces)} ${pieces === 1 ? 'piece comes' : 'pieces come'} out of ${formatCount(units)} whole ${units === 1 ? 'unit' : 'units'}.`;
  return units === least
    ? `${come} No way of sawing them takes fewer.`
    : `${come} No way of sawing them takes fewer than ${formatCount(least)}.`;
}
