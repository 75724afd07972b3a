import { Plus } from 'lucide-react';
import { useMemo, useRef, useState } from 'react';
import type { Point } from '@/geometry/point';
import { ringStarts, surveyPointName, tapeName, type Survey } from '@/paving/survey/survey';
import { surveyAnswer } from '@/paving/survey/survey-answer';
import {
  lettersTurned,
  pegAdded,
  pegTakenAway,
  shapeTaken,
  tapeAdded,
  tapeBetween,
  tapeSide,
} from '@/paving/survey/survey-edits';
import { surveyedGround } from '@/paving/survey/survey-ground';
import { surveyWords } from '@/paving/survey/survey-words';
import { Dialog } from '../../ui/Dialog';
import { FiguredWords } from '../../ui/FiguredWords';
import { SelectField } from '../../ui/SelectField';
import { zoomToFit } from '../FloorStage';
import { useTable, useTableStore } from '../table-context';
import { SurveyBegin } from './SurveyBegin';
import { ShapeSketch, SurveyPicture } from './SurveyPicture';
import { TapeRow } from './TapeRow';

/** The tape survey: readings on one side, the shape that they make on the other. */
export function SurveyDialog({ open, onClose }: { open: boolean; onClose: () => void }) {
  return (
    <Dialog open={open} onClose={onClose} title="Tape survey" wide>
      {open && <SurveySheet onClose={onClose} />}
    </Dialog>
  );
}

function SurveySheet({ onClose }: { onClose: () => void }) {
  const table = useTableStore();
  const document = useTable((state) => state.document);
  const { survey } = document;
  // Every reading is kept with the layout as it is typed, and can be undone on the table.
  const onSurvey = (next: Survey | undefined) =>
    table.getState().edit(({ survey: _, ...now }) => (next ? { ...now, survey: next } : now));
  if (!survey) return <SurveyBegin document={document} onSurvey={onSurvey} />;
  return <SurveyForm survey={survey} onSurvey={onSurvey} onClose={onClose} />;
}

const STATE_LOOK = {
  short: 'border-slate bg-stone-100',
  bare: 'border-slate bg-stone-100',
  part: 'border-amber bg-stone-100',
  agrees: 'border-vial bg-stone-100',
  doubt: 'border-amber bg-amber-wash',
} as const;

const STATE_NAME = {
  short: 'More tapes are needed',
  bare: 'Fixed, but not checked',
  part: 'Fixed, but not all is checked',
  agrees: 'The tapes agree',
  doubt: 'The tapes do not agree',
} as const;

/** Said beside what lays the ground, where the rest may be out of sight. */
const STATE_CAUTION = {
  short: 'More tapes are needed before it is a ground.',
  bare: 'Nothing checks these tapes yet. Tape one more before anybody digs.',
  part: 'A part is not checked yet. Tape more before anybody digs.',
  agrees: 'The tapes agree.',
  doubt: 'A reading is wrong, and it bends this shape. Put it right before anybody digs.',
} as const;

function SurveyForm({
  survey,
  onSurvey,
  onClose,
}: {
  survey: Survey;
  onSurvey: (survey: Survey | undefined) => void;
  onClose: () => void;
}) {
  const table = useTableStore();
  const document = useTable((state) => state.document);
  const { display } = document;
  const [live, setLive] = useState<number | null>(null);
  const [opened, setOpened] = useState<number | null>(null);
  const list = useRef<HTMLDivElement>(null);
  const answer = useMemo(() => surveyAnswer(survey), [survey]);
  const { state, words } = useMemo(
    () => surveyWords(survey, answer, display),
    [survey, answer, display],
  );
  const places = answer.places.map((place, n): Point => place ?? survey.sketch[n]);
  const corners = ringStarts(survey)[1];
  const ground = surveyedGround(survey, answer, document.ground);

  const lay = () => {
    if (!ground) return;
    // On a ground of another shape nothing is left of the units that were lifted by hand.
    const anew = document.ground.perimeter.length !== ground.perimeter.length;
    table.getState().edit((now) => ({ ...now, ground, ...(anew && { lifted: [] }) }));
    const drawn = ground.keepOuts.length > survey.rings.length - 1;
    table.getState().set({
      pick: null,
      hover: null,
      said: `The ground is as taped.${drawn ? ' Keep-outs that were not taped stand where they were drawn.' : ''} Undo brings back the one before.`,
    });
    zoomToFit(table);
    onClose();
  };

  /** Enter in one reading goes on to the next. */
  const onKeyDown = (event: React.KeyboardEvent) => {
    if (event.key !== 'Enter' || !(event.target instanceof HTMLInputElement)) return;
    const fields = [...list.current!.querySelectorAll<HTMLInputElement>('[data-tape] input')];
    const at = fields.indexOf(event.target);
    if (at < 0) return;
    event.preventDefault();
    fields[at + 1]?.focus();
  };

  const groups = [
    { name: 'Sides', tapes: indexesOf(survey, (n) => tapeSide(survey, survey.tapes[n]) !== null) },
    { name: 'Across', tapes: indexesOf(survey, (n) => tapeSide(survey, survey.tapes[n]) === null) },
  ];
  return (
    <div className="gap-6 md:grid md:grid-cols-[minmax(0,1fr)_minmax(0,24rem)]">
      <div className="space-y-3 md:sticky md:top-0 md:self-start">
        <SurveyPicture {...{ survey, answer, places }} picked={live} />
        <p className="text-sm text-slate">
          Letters run anticlockwise, as seen from above: walking from A to B, the ground is on your
          left. Dotted tapes are still to be read; an empty ring is a point that stands as sketched.
        </p>
        {answer.others.length > 0 && (
          <div className="space-y-1">
            <p>
              The same tapes also make{' '}
              {answer.others.length === 1 ? 'another shape' : 'other shapes'}, with a corner on its
              other side.
              {answer.telling &&
                answer.doubts.length === 0 &&
                ` ${tapeName(survey, answer.telling)} would tell which is meant.`}
            </p>
            <div className="grid grid-cols-3 gap-2">
              {answer.others.map((other, n) => (
                <button
                  key={n}
                  type="button"
                  className="button flex-col"
                  onClick={() => onSurvey(shapeTaken(survey, other))}
                >
                  <ShapeSketch places={other} corners={corners} />
                  <span>Take this shape</span>
                </button>
              ))}
            </div>
          </div>
        )}
      </div>
      <div className="mt-4 space-y-4 md:mt-0">
        <div
          role="status"
          data-testid="survey-state"
          data-state={state}
          className={`border-l-4 px-3 py-2 ${STATE_LOOK[state]}`}
        >
          <b className="block">{STATE_NAME[state]}</b>
          {words.map((sentence, n) => (
            <p key={n}>
              <FiguredWords words={sentence} display={display} />
            </p>
          ))}
        </div>
        <div ref={list} onKeyDown={onKeyDown} className="space-y-4 [&_input]:scroll-mb-36">
          {groups.map(({ name, tapes }) => (
            <section key={name} aria-label={name}>
              <div className="flex items-baseline border-b border-graphite pb-1">
                <h3 className="flex-1">{name}</h3>
                <span className="text-sm text-slate">off by</span>
              </div>
              {tapes.length === 0 ? (
                <p className="py-2 text-slate">None yet.</p>
              ) : (
                <ul className="hairlines">
                  {tapes.map((index) => (
                    <TapeRow
                      key={`${survey.tapes[index].from}-${survey.tapes[index].to}-${tapesBefore(survey, index)}`}
                      {...{ survey, answer, index, display, onSurvey }}
                      live={live === index}
                      open={opened === index}
                      onLive={setLive}
                      onOpen={setOpened}
                    />
                  ))}
                </ul>
              )}
            </section>
          ))}
        </div>
        <AddTape survey={survey} onSurvey={onSurvey} onShow={setOpened} />
        <div className="flex flex-wrap gap-2">
          <button type="button" className="button" onClick={() => onSurvey(pegAdded(survey))}>
            <Plus size={16} aria-hidden /> Add a peg to tape from
          </button>
          {survey.pegs > 0 && (
            <button
              type="button"
              className="button button-quiet"
              onClick={() => {
                setOpened(null);
                onSurvey(pegTakenAway(survey));
              }}
            >
              Take peg {surveyPointName(survey, survey.sketch.length - 1)} away
            </button>
          )}
          <button
            type="button"
            className="button button-quiet"
            onClick={() => {
              setOpened(null);
              onSurvey(lettersTurned(survey));
            }}
          >
            My letters run clockwise
          </button>
          <BeginAnew read={survey.tapes.some(isRead)} onAnew={() => onSurvey(undefined)} />
        </div>
        <p className="text-sm text-slate">
          Letters that run clockwise would give the ground as in a mirror, and no tape can show
          that. Turned round, A stays and the others change places: chalk them anew.
        </p>
        <div className="sticky -bottom-4 -mb-4 flex flex-wrap justify-end gap-2 border-t border-graphite bg-stone-50 pt-3 pb-5">
          <p
            data-testid="survey-caution"
            className={`w-full text-sm ${state === 'doubt' ? 'font-semibold text-amber' : 'text-slate'}`}
          >
            {STATE_CAUTION[state]}
          </p>
          <button type="button" className="button" onClick={onClose}>
            Go on later
          </button>
          <button
            type="button"
            className="button button-primary"
            disabled={ground === null}
            onClick={lay}
          >
            Use this ground
          </button>
        </div>
      </div>
    </div>
  );
}

const isRead = ({ length }: Survey['tapes'][number]): boolean => length !== undefined;

/** Rubs the whole survey out; asked once more where there is anything to lose. */
function BeginAnew({ read, onAnew }: { read: boolean; onAnew: () => void }) {
  const [asked, setAsked] = useState(false);
  if (!asked)
    return (
      <button
        type="button"
        className="button button-quiet"
        onClick={() => (read ? setAsked(true) : onAnew())}
      >
        Begin anew
      </button>
    );
  return (
    <div role="group" aria-label="Begin anew" className="flex w-full flex-wrap gap-2">
      <p className="w-full">All readings go. Undo on the table brings them back.</p>
      <button type="button" className="button" onClick={onAnew}>
        Rub all readings out
      </button>
      <button
        type="button"
        autoFocus
        className="button button-quiet scroll-mb-36"
        onClick={() => setAsked(false)}
      >
        Keep them
      </button>
    </div>
  );
}

const indexesOf = ({ tapes }: Survey, keep: (index: number) => boolean): number[] =>
  tapes.flatMap((_, n) => (keep(n) ? [n] : []));

/** How many tapes between the same points stand before this one. */
const tapesBefore = ({ tapes }: Survey, index: number): number =>
  tapes
    .slice(0, index)
    .filter(({ from, to }) => from === tapes[index].from && to === tapes[index].to).length;

/** The first two points between which no tape is listed; the first two of all where there is one everywhere. */
function untaped(survey: Survey): { from: number; to: number } {
  for (let from = 0; from < survey.sketch.length; from++)
    for (let to = from + 1; to < survey.sketch.length; to++)
      if (tapeBetween(survey, from, to) < 0) return { from, to };
  return { from: 0, to: 1 };
}

/** A further tape, between any two points. */
function AddTape({
  survey,
  onSurvey,
  onShow,
}: {
  survey: Survey;
  onSurvey: (survey: Survey) => void;
  onShow: (index: number) => void;
}) {
  const [first] = useState(() => untaped(survey));
  const [from, setFrom] = useState(String(first.from));
  const [to, setTo] = useState(String(first.to));
  const options = survey.sketch.map((_, n): readonly [string, string] => [
    String(n),
    surveyPointName(survey, n),
  ]);
  const [a, b] = [Number(from), Number(to)];
  const there = tapeBetween(survey, a, b);
  return (
    <div className="flex items-end gap-2">
      <SelectField
        label="A tape from"
        value={from}
        options={options}
        onValue={setFrom}
        className="flex-1"
      />
      <SelectField label="to" value={to} options={options} onValue={setTo} className="flex-1" />
      <button
        type="button"
        className="button"
        disabled={a === b || a >= options.length || b >= options.length}
        onClick={() => {
          onSurvey(tapeAdded(survey, a, b));
          onShow(there >= 0 ? there : survey.tapes.length);
        }}
      >
        {there >= 0 ? 'Show it' : 'Add'}
      </button>
    </div>
  );
}
