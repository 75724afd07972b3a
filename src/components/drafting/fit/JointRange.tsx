import { proxy } from 'comlink';
import { useEffect, useRef, useState } from 'react';
import { formatCount } from '@/paving/count';
import type { JointFit, JointRange as SoughtRange } from '@/paving/fit/joint-range';
import { formatLength, MM_PER_INCH, type Display } from '@/paving/length';
import { LengthField } from '../../ui/LengthField';
import { lengthWithin } from '../field-limits';
import { useTable, useTableStore } from '../table-context';
import { newHand, dismissed, type Hand } from './fit-hand';
import { fitKey } from './fit-service';
import { jointsTold, jointText } from './joints-told';

/** Joints that the trade allows for blocks: 2 to 5 mm, 1/16 to 3/16 in (construction tolerances for interlocking pavements, ICPI). */
const FIRST_RANGE: Readonly<Record<Display, SoughtRange>> = {
  metric: { from: 2, to: 5, step: 0.25 },
  imperial: { from: MM_PER_INCH / 16, to: (3 * MM_PER_INCH) / 16, step: MM_PER_INCH / 16 },
};

/** Bounds of what may be typed: wider than this is no joint, finer steps than that nobody can lay. */
const GREATEST_JOINT_MM = 500;
const LEAST_STEP_MM = 0.01;

/** Seeks the joint, within a range, at which one more row closes or the field ends evenly. */
export function JointRange() {
  const table = useTableStore();
  const document = useTable((state) => state.document);
  const { display, bond } = document;
  const [typed, setTyped] = useState<SoughtRange | null>(null);
  const range = typed ?? FIRST_RANGE[display];
  const [found, setFound] = useState<readonly JointFit[] | null>(null);
  const [failure, setFailure] = useState<string | null>(null);
  const [share, setShare] = useState<number | null>(null);
  const hand = useRef<Hand | null>(null);
  const stop = () => {
    hand.current = dismissed(hand.current);
    setShare(null);
  };
  useEffect(() => stop, []);
  const hold = useTable((state) => state.hold);
  // What was found stands for any joint, and falls with anything else.
  const key = fitKey({ ...document, bond: { ...bond, joint: 0 } as typeof bond }, hold);
  useEffect(() => {
    stop();
    setFound(null);
    setFailure(null);
  }, [key]);

  const length = (mm: number) => formatLength(mm, display, { decimals: 2 });
  const seek = async () => {
    stop();
    setFailure(null);
    setFound(null);
    if (range.from > range.to) {
      setFailure(
        `From ${jointText(range.from, display)} to ${jointText(range.to, display)} runs backwards: the narrower joint comes first.`,
      );
      return;
    }
    setShare(0);
    const mine = newHand();
    hand.current = mine;
    try {
      const answer = await mine.remote.joints(
        document,
        range,
        hold,
        proxy((done: number) => hand.current === mine && setShare(done)),
      );
      if (hand.current !== mine) return;
      if (answer.ok) setFound(answer.joints);
      else setFailure(answer.message);
    } catch (error) {
      if (hand.current === mine) setFailure(error instanceof Error ? error.message : String(error));
    }
    if (hand.current === mine) stop();
  };

  const most = found ? Math.max(...found.map((joint) => joint.wholeUnits)) : 0;
  return (
    <section aria-label="Joint range">
      <h3 className="mb-2 border-b border-graphite pb-1">Joint within a range</h3>
      <div className="grid grid-cols-3 gap-2">
        {(['from', 'to', 'step'] as const).map((part) => (
          <LengthField
            key={part}
            label={{ from: 'From', to: 'To', step: 'By' }[part]}
            mm={range[part]}
            display={display}
            decimals={2}
            refuse={(mm) =>
              part === 'step' && mm < LEAST_STEP_MM
                ? 'That step is too fine to be laid.'
                : lengthWithin(display, 0, GREATEST_JOINT_MM)(mm)
            }
            onLength={(mm) => setTyped({ ...range, [part]: mm })}
          />
        ))}
      </div>
      <button
        type="button"
        className="button mt-2 w-full"
        onClick={() => (share === null ? void seek() : stop())}
      >
        {share === null ? 'Try these joints' : `Stop (${Math.round(share * 100)} %)`}
      </button>
      {failure && (
        <p role="alert" className="mt-2 text-sm text-brick first-letter:uppercase">
          {failure}
        </p>
      )}
      {found && found.length > 0 && (
        <p className="mt-2 text-sm" data-testid="joints-told">
          {jointsTold(found, display)}
        </p>
      )}
      {found && (
        <ul className="mt-2 hairlines">
          {found.map((joint) => (
            <li key={joint.joint}>
              <button
                type="button"
                className={`grid min-h-11 w-full grid-cols-[1fr_1fr_auto] items-center gap-2 px-1 text-left hover:bg-stone-100 ${joint.wholeUnits === most ? 'font-semibold' : ''}`}
                onClick={() => {
                  table.getState().edit((now) => ({
                    ...now,
                    bond: { ...now.bond, joint: joint.joint } as typeof now.bond,
                    placement: joint.placement,
                  }));
                  table
                    .getState()
                    .set({ said: `${formatCount(joint.wholeUnits)} whole units with this joint.` });
                }}
              >
                <span>{jointText(joint.joint, display)}</span>
                <span>
                  {formatCount(joint.wholeUnits)} whole{joint.closes && ', just closes'}
                </span>
                <span className="text-slate">
                  {joint.play === null ? '–' : `±${length(joint.play)}`}
                </span>
              </button>
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}
