import { FloorProblems } from '../FloorFigures';
import { EarthFigures } from '../levels/EarthFigures';
import { FinishFields } from '../levels/FinishFields';
import { LayerFields } from '../levels/LayerFields';
import { LevelAdvice } from '../levels/LevelAdvice';
import { MapKey } from '../levels/MapKey';
import { PegTable } from '../levels/PegTable';
import { ScreedBoardPicture } from '../levels/ScreedBoardPicture';
import { SpotFields } from '../levels/SpotFields';
import { useShownFloor } from '../table-context';

/** Levels: what is dug, filled and laid under the floor, and how high it comes to lie. */
export function LevelsPanel() {
  const floor = useShownFloor();
  if (floor.problems.length > 0) return <FloorProblems />;
  return (
    <div className="space-y-7">
      <EarthFigures />
      <MapKey />
      <LayerFields />
      <FinishFields />
      <SpotFields />
      <LevelAdvice />
      <PegTable />
      <ScreedBoardPicture />
    </div>
  );
}
