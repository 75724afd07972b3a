import { figuredText } from '../figured-words';
import type { Display } from '../length';
import { surveyPointName, tapeName, type Survey } from './survey';
import { surveyAnswer } from './survey-answer';
import { surveyWords } from './survey-words';

/** What a survey comes to, for the command: points and tapes by name, lengths in mm; null where nothing is known. */
export function surveyPrinted(survey: Survey, display: Display) {
  const answer = surveyAnswer(survey);
  const { state, words } = surveyWords(survey, answer, display);
  const named = (tape: { readonly from: number; readonly to: number } | null) =>
    tape && tapeName(survey, tape);
  return {
    state,
    words: words.map((sentence) => figuredText(sentence, display)),
    spare: answer.spare,
    points: answer.places.map((at, n) => ({
      name: surveyPointName(survey, n),
      at,
      error: at ? answer.error[n] : null,
    })),
    tapes: survey.tapes.map((tape, n) => ({
      tape: named(tape),
      read: tape.length ?? null,
      ...(tape.left ? { left: true } : {}),
      computed: answer.tapes[n]?.computed ?? null,
      off: answer.tapes[n]?.residual ?? null,
      standardised: answer.tapes[n]?.standardised ?? null,
    })),
    doubts: answer.doubts.map(({ tapes, should }) =>
      tapes.map((tape, n) => ({ tape: named(survey.tapes[tape]), should: should[n] })),
    ),
    telling: named(answer.telling),
    others: answer.others,
  };
}
