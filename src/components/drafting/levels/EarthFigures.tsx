import type { ReactNode } from 'react';
import { documentBuildUp } from '@/paving/build-up';
import { formatArea } from '@/paving/area';
import { formatLength } from '@/paving/length';
import { formatVolume } from '@/paving/volume';
import type { EarthVolumes } from '@/takeoff/earth-volumes';
import { formatWorkedVolume } from '@/takeoff/measures';
import { earthOf } from '../earth';
import { useSettledFloor } from '../table-context';
import { useRestingFloor } from './use-resting-floor';

interface Line {
  readonly name: string;
  readonly id: string;
  readonly of: (volumes: EarthVolumes) => number;
  /** With its numbers, so that a person can check it by hand. */
  readonly formula: ReactNode;
}

/** What is dug and laid, live, each with its formula and what it stood at before the gesture in hand. */
export function EarthFigures() {
  const shown = useRestingFloor();
  const settled = useSettledFloor();
  const earth = earthOf(shown);
  const was = settled === shown ? null : (earthOf(settled)?.volumes ?? null);
  if (!earth) return null;
  const { volumes } = earth;
  const { document } = shown;
  const { display } = document;
  const { base, bedding, overdig } = documentBuildUp(document);
  const volume = (m3: number) => formatVolume(m3, display);
  const worked = (m3: number) => formatWorkedVolume(m3, display);
  const thick = (mm: number) => formatLength(mm, display, { decimals: 1 });
  const lines: Line[] = [
    {
      name: 'To dig out',
      id: 'cut',
      of: ({ cut }) => cut,
      formula:
        volumes.from === 'assumed'
          ? `as if the ground were level with the edge: ${formatArea(volumes.dugArea, display)}${overdig > 0 ? ' with the overdig' : ''}`
          : `from the spots, over ${formatArea(volumes.cutArea, display)}, at most ${thick(volumes.deepestCut)} deep`,
    },
    {
      name: 'Base, compacted',
      id: 'base',
      of: (each) => each.base,
      formula: `${thick(base)} × ${formatArea(volumes.dugArea, display)} = ${worked(volumes.baseLayer)}${
        volumes.fill > 0
          ? `, and ${worked(volumes.fill)} where the ground is low (${formatArea(volumes.fillArea, display)}, at most ${thick(volumes.deepestFill)})`
          : ''
      }`,
    },
    {
      name: 'Bedding',
      id: 'bedding',
      of: (each) => each.bedding,
      formula: `${thick(bedding)} × ${formatArea(volumes.area, display)} = ${worked(volumes.beddingLayer)}${
        volumes.beddingUnderThin > 0
          ? `, and ${worked(volumes.beddingUnderThin)} under thinner units`
          : ''
      }`,
    },
  ];
  return (
    <section aria-label="What is dug and laid">
      <dl className="border-t border-graphite hairlines">
        {lines.map(({ name, id, of, formula }) => {
          const before = was && volume(of(was)) !== volume(of(volumes)) ? volume(of(was)) : null;
          return (
            <div key={id} className="py-1.5">
              <div className="flex items-baseline justify-between gap-3">
                <dt>{name}</dt>
                <dd className="text-right text-[1.15rem] font-bold whitespace-nowrap">
                  {before && (
                    <span className="mr-2 text-sm font-normal text-line">was {before}</span>
                  )}
                  <span data-testid={`earth-${id}`}>{volume(of(volumes))}</span>
                </dd>
              </div>
              <dd className="text-sm text-slate">{formula}</dd>
            </div>
          );
        })}
      </dl>
      <p className="mt-1 text-sm text-slate">
        As they lie in the ground. What is dug is carted away, as it lies: the low places are made
        up with base.
      </p>
    </section>
  );
}
