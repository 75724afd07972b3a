import { useEffect, useRef } from 'react';
import type { Display } from '@/paving/length';
import { formatLength } from '@/paving/length';
import { GREATEST_TAPE_MM, tapeName, type Survey } from '@/paving/survey/survey';
import type { SurveyAnswer } from '@/paving/survey/survey-answer';
import {
  sideBent,
  tapeLeftOut,
  tapeReadAs,
  tapeSide,
  tapeTakenAway,
} from '@/paving/survey/survey-edits';
import { LengthField } from '../../ui/LengthField';
import { sizeWithin } from '../field-limits';

interface Props {
  readonly survey: Survey;
  readonly answer: SurveyAnswer;
  readonly index: number;
  readonly display: Display;
  /** Its field has the focus, or it is open: it is the one that is drawn as live. */
  readonly live: boolean;
  /** More can be done with it. */
  readonly open: boolean;
  readonly onLive: (index: number) => void;
  readonly onOpen: (index: number | null) => void;
  readonly onSurvey: (survey: Survey) => void;
}

/** What the tape is off, as it is read: + where it reads too long. */
function Off({
  survey,
  answer,
  index,
  display,
}: Pick<Props, 'survey' | 'answer' | 'index' | 'display'>) {
  const { length, left } = survey.tapes[index];
  const found = answer.tapes[index];
  const doubted = answer.doubts.some(({ tapes }) => tapes.includes(index));
  if (length === undefined) return <span className="text-slate">to read</span>;
  if (left) return <span className="text-slate">left out</span>;
  if (!found || found.share === 0) return <span className="text-slate">no check</span>;
  const off = formatLength(Math.abs(found.residual), display, { decimals: 1 });
  const sign = Math.abs(found.residual) < 0.05 ? '' : found.residual > 0 ? '+' : '−';
  return doubted ? (
    <b className="text-amber">
      <span aria-hidden>? </span>
      <span className="sr-only">in doubt, off by </span>
      {sign}
      {off}
    </b>
  ) : (
    <span>
      <span className="sr-only">off by </span>
      {sign}
      {off}
    </span>
  );
}

/** One tape: its two ends, what it reads, what it is off; more once it is picked. */
export function TapeRow({
  survey,
  answer,
  index,
  display,
  live,
  open,
  onLive,
  onOpen,
  onSurvey,
}: Props) {
  const tape = survey.tapes[index];
  const name = tapeName(survey, tape);
  const side = tapeSide(survey, tape);
  const row = useRef<HTMLLIElement>(null);
  useEffect(() => {
    if (open) row.current?.scrollIntoView({ block: 'nearest' });
  }, [open]);
  const rise =
    side && survey.arcs.find((arc) => arc.ring === side.ring && arc.edge === side.edge)?.rise;
  return (
    <li ref={row} className="py-1" onFocus={() => onLive(index)}>
      <div className="flex items-center gap-2">
        <button
          type="button"
          aria-expanded={open}
          className={`min-h-9 w-20 shrink-0 text-left font-semibold pointer-coarse:min-h-11 ${live ? 'text-line' : ''}`}
          onClick={() => onOpen(open ? null : index)}
        >
          {name}
          <span className="sr-only">, more about this tape</span>
        </button>
        <div className="min-w-0 flex-1" data-tape={index}>
          <LengthField
            label={`Tape ${name}`}
            hideLabel
            mm={tape.length ?? null}
            display={display}
            refuse={sizeWithin(display, GREATEST_TAPE_MM)}
            onLength={(mm) => onSurvey(tapeReadAs(survey, index, mm))}
          />
        </div>
        <div className="w-24 shrink-0 text-right text-[0.92rem]" data-testid={`off-${index}`}>
          <Off {...{ survey, answer, index, display }} />
        </div>
      </div>
      {open && (
        <div className="my-2 ml-2 space-y-2 border-l-2 border-line py-1 pl-3">
          {side && (
            <LengthField
              label="Rise over the straight line, where the side is an arc (− bends inward)"
              mm={rise ?? 0}
              display={display}
              refuse={(mm) =>
                Math.abs(mm) > GREATEST_TAPE_MM ? 'That rise is too great for this side.' : null
              }
              onLength={(mm) => onSurvey(sideBent(survey, side.ring, side.edge, mm))}
            />
          )}
          <div className="flex flex-wrap gap-2">
            {tape.length !== undefined && (
              <>
                <button
                  type="button"
                  className="button"
                  onClick={() => onSurvey(tapeLeftOut(survey, index, !tape.left))}
                >
                  {tape.left ? 'Take it into account' : 'Leave it out'}
                </button>
                <button
                  type="button"
                  className="button button-quiet"
                  onClick={() => onSurvey(tapeReadAs(survey, index, null))}
                >
                  Rub the reading out
                </button>
              </>
            )}
            <button
              type="button"
              className="button button-quiet"
              onClick={() => {
                onOpen(null);
                onSurvey(tapeTakenAway(survey, index));
              }}
            >
              Take this tape off the list
            </button>
          </div>
        </div>
      )}
    </li>
  );
}
