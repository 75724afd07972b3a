import type { LayoutDocument } from '@/paving/layout-document';
import { layFloor } from '@/paving/laying';
import { floorReport } from '@/paving/report';
import { boxRing } from '@/sheets/drawing';
import { PAPER } from '@/sheets/inks';
import { keepOutPlace } from '@/sheets/keep-out-place';
import { planDrawing } from '@/sheets/plan-drawing';
import { NO_STAMP, type PlanInput } from '@/sheets/plan-input';
import { planSheets } from '@/sheets/plan-sheet';
import { pointsBounds, viewCentred } from '@/sheets/plan-view';
import { startPoint } from '@/sheets/start-point';
import { drawingSvg } from '@/sheets/svg-sink';

const sheetInput = (document: LayoutDocument): PlanInput => {
  const laying = layFloor(document);
  return {
    laying,
    report: floorReport(laying),
    firm: 'Your firm',
    project: 'Court by the orchard',
    layout: 'Slabs in running bond',
    version: 2,
    label: 'Wider margins',
    creator: 'You',
    documentNumber: 'K3M9TQ-2',
    date: '2026-05-12T08:40:00.000Z',
    fingerprint: 'c0ffee2b1d',
    state: 'issued',
    stamp: { ...NO_STAMP, issuedAt: '2026-05-20T07:05:00.000Z' },
    paper: 'A4',
  };
};

/** The figured floor without a sheet round it. `figures`: what stands on it. */
export function floorPicture(document: LayoutDocument, figures: 'ground' | 'gaps'): string {
  const input = sheetInput(document);
  const { ground } = input.laying;
  const bounds = pointsBounds(ground.rings[0].edges.flatMap((edge) => edge.chords));
  const scale = 68;
  const [width, height] = [0, 1].map(
    (axis) => (bounds.greatest[axis] - bounds.least[axis]) / scale + 30,
  );
  const frame = { left: 0, top: 0, right: width, bottom: height };
  const bare = figures === 'ground';
  const facts = {
    input: bare ? { ...input, report: { ...input.report, edges: [] } } : input,
    start: bare ? null : startPoint(input.laying),
    keepOuts: ground.rings.slice(1).map((ring) => keepOutPlace(ground, ring)),
    asCourses: false,
    parts: [],
  };
  const { layers } = planDrawing(facts, viewCentred(bounds, scale, frame), frame);
  const paper = boxRing(frame);
  const sheet = {
    name: 'paper',
    commands: [{ kind: 'path' as const, rings: [paper], fill: PAPER }],
  };
  return drawingSvg({ width, height, layers: [sheet, ...layers] });
}

export const sheetPicture = (document: LayoutDocument): string =>
  drawingSvg(planSheets(sheetInput(document))[0]);

export const wholeUnits = (document: LayoutDocument): number => layFloor(document).laid.count;
