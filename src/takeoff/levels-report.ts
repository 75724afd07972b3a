import { buildUpAdvice, type Advice } from '@/paving/build-up-advice';
import { layFloor } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { earthModel } from './earth-cells';
import { earthVolumes, type EarthVolumes } from './earth-volumes';
import { pegLevels, type PegLevel } from './peg-levels';
import { screedBoard, type ScreedBoard } from './screed-board';

/** Everything about the levels of a floor in one: lengths mm, areas m², volumes m³ in place. */
export interface LevelsReport {
  readonly volumes: EarthVolumes;
  readonly pegs: readonly PegLevel[];
  readonly screed: ScreedBoard;
  readonly advice: readonly Advice[];
}

/** Volumes, levels at pegs, the board and the advice about a document. */
export function levelsReport(document: LayoutDocument): LevelsReport {
  const laying = layFloor(document);
  const model = earthModel(document, laying.ground);
  return {
    volumes: earthVolumes(laying, model),
    pegs: pegLevels(document, model),
    screed: screedBoard(document),
    advice: buildUpAdvice(document),
  };
}
