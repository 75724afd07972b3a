import { useMemo } from 'react';
import { formatCount } from '@/paving/count';
import { formatLength } from '@/paving/length';
import { screedPicture } from '@/sheets/screed-picture';
import { BOARD_SHORTER_MM, screedBoard } from '@/takeoff/screed-board';
import { SheetPicture } from '../../ui/SheetPicture';
import { useShownFloor } from '../table-context';

const PICTURE = { left: 1, top: 1, right: 83, bottom: 43 };

const passWords = (passes: number): string =>
  passes === 1 ? 'one pass' : `${formatCount(passes)} passes side by side`;

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
      {board.limbs.length === 1 ? (
        <p>
          <b>{shown(board.clearWidth)}</b> clear from edge to edge. Lower edge{' '}
          <b>{shown(board.boardLength)}</b> long, hung <b>{shown(board.depth)}</b> below the ears;{' '}
          {passWords(board.passes)}, pulled along the arrows.
        </p>
      ) : (
        <>
          <p>
            The floor has {formatCount(board.limbs.length)} limbs, each with its own clear width,
            pulled along its arrows. The lower edge hangs <b>{shown(board.depth)}</b> below the
            ears.
          </p>
          <ol className="list-decimal pl-5">
            {board.limbs.map((limb, n) => (
              <li key={n}>
                <b>{shown(limb.clearWidth)}</b> clear, {passWords(limb.passes)}: lower edge{' '}
                <b>{shown(limb.boardLength)}</b>
              </li>
            ))}
          </ol>
          <p className="text-sm text-slate">
            The largest limb comes first, and the picture’s board is for it. A board that is as long
            as another’s does for both.
          </p>
        </>
      )}
      <p className="text-sm text-slate">
        {board.rides === 'edge'
          ? 'The ears ride on the top of the edge'
          : 'The ears ride on rails set to the finish at the pegs'}
        {board.rails > 0 &&
          (board.rides === 'edge'
            ? ` and on ${board.rails === 1 ? 'a rail' : `${board.rails} rails`} ${board.limbs.length === 1 ? 'between the passes' : 'between passes and along open sides'}`
            : `: ${board.rails} of them`)}
        . The board is {shown(BOARD_SHORTER_MM)} shorter than the clear width, so that it can be
        worked from side to side (common practice).
      </p>
    </section>
  );
}
