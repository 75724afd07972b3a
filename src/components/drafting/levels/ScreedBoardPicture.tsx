import { useMemo } from 'react';
import { formatLength } from '@/paving/length';
import { screedPicture } from '@/sheets/screed-picture';
import { BOARD_SHORTER_MM, screedBoard } from '@/takeoff/screed-board';
import { SheetPicture } from '../../ui/SheetPicture';
import { useShownFloor } from '../table-context';

const PICTURE = { left: 1, top: 1, right: 83, bottom: 43 };

/** The board to draw the bedding off with: how long, how deep, how many passes, which way. */
export function ScreedBoardPicture() {
  const { document } = useShownFloor();
  const { display } = document;
  const board = useMemo(() => screedBoard(document), [document]);
  const commands = useMemo(() => screedPicture(document, PICTURE, 'screed'), [document]);
  const shown = (mm: number) => formatLength(mm, display);
  return (
    <section aria-label="Screed board" className="space-y-2">
      <h2 className="border-b border-graphite pb-1 text-base">Screed board</h2>
      <SheetPicture
        commands={commands}
        width={84}
        height={44}
        label={`The screed board: lower edge ${shown(board.boardLength)}, ${shown(board.depth)} below its ears.`}
      />
      <p>
        Lower edge <b>{shown(board.boardLength)}</b> long, hung <b>{shown(board.depth)}</b> below
        the ears; {board.passes === 1 ? 'one pass' : `${board.passes} passes side by side`}, pulled
        along the arrows.
      </p>
      <p className="text-sm text-slate">
        {board.rides === 'edge'
          ? 'The ears ride on the top of the edge'
          : 'The ears ride on rails set to the finish at the pegs'}
        {board.rails > 0 &&
          (board.rides === 'edge'
            ? ` and on ${board.rails === 1 ? 'a rail' : `${board.rails} rails`} between the passes`
            : `: ${board.rails} of them`)}
        . The board is {shown(BOARD_SHORTER_MM)} shorter than the clear width, so that it can be
        worked from side to side (common practice).
      </p>
    </section>
  );
}
