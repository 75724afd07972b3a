import { useState } from 'react';
import type { LayoutDocument } from '@/paving/layout-document';
import { freshSurvey, groundSurvey } from '@/paving/survey/survey-edits';
import { GREATEST_SURVEY_POINTS, type Survey } from '@/paving/survey/survey';
import { NumberField } from '../../ui/NumberField';

/** Corners that a survey may begin with. */
const MOST_CORNERS = 40;

/** How a survey begins: from the ground as drawn, or from a number of corners alone. */
export function SurveyBegin({
  document,
  onSurvey,
}: {
  document: LayoutDocument;
  onSurvey: (survey: Survey) => void;
}) {
  const [corners, setCorners] = useState(4);
  const { perimeter, keepOuts } = document.ground;
  const points = perimeter.length + keepOuts.reduce((sum, { ring }) => sum + ring.length, 0);
  const drawable = perimeter.length >= 3 && keepOuts.every(({ ring }) => ring.length >= 3);
  return (
    <div className="space-y-5">
      <p>
        Tape the sides and enough diagonals, in any order. Evenlay finds the shape that agrees best
        with all of them and shows how far each tape is off, so that a wrong reading stands out.
      </p>
      <section className="space-y-2 border-t border-graphite pt-3">
        <h3>The ground as drawn</h3>
        <p className="text-slate">
          {perimeter.length} corners
          {keepOuts.length > 0 &&
            ` and ${keepOuts.length === 1 ? 'one keep-out' : `${keepOuts.length} keep-outs`}`}
          . A rough drawing will do; the tapes put it right.
        </p>
        {drawable && points <= GREATEST_SURVEY_POINTS ? (
          <button
            type="button"
            className="button button-primary"
            onClick={() => onSurvey(groundSurvey(document))}
          >
            Tape the ground as drawn
          </button>
        ) : (
          <p>
            {drawable
              ? `It has ${points} points; a tape survey takes ${GREATEST_SURVEY_POINTS}.`
              : 'A ring of fewer than three corners cannot be taped. Put corners into it first.'}
          </p>
        )}
      </section>
      <section className="space-y-2 border-t border-stone-300 pt-3">
        <h3>Another ground</h3>
        <p className="text-slate">
          Chalk a letter at each corner first: A wherever you like, then B, C and on as you walk
          round with the ground on your <b>left</b> hand.
        </p>
        <div className="flex items-end gap-3">
          <div className="w-28">
            <NumberField
              label="Corners"
              value={corners}
              refuse={(value) =>
                Number.isInteger(value) && value >= 3 && value <= MOST_CORNERS
                  ? null
                  : `A whole number, 3 to ${MOST_CORNERS}.`
              }
              onNumber={setCorners}
            />
          </div>
          <button type="button" className="button" onClick={() => onSurvey(freshSurvey(corners))}>
            Begin with these
          </button>
        </div>
      </section>
    </div>
  );
}
