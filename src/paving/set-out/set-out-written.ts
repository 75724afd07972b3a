import { figuredText, type FiguredWords } from '../figured-words';
import type { Display } from '../length';
import type { Advice, Check, ControlPoint, SetOut } from './set-out-types';

type Written<T, K extends keyof T> = Omit<T, K> & { readonly [key in K]: string };

/** A set-out whose sentences are written out in one display's units, for whoever takes it as plain data. */
export type WrittenSetOut = Omit<SetOut, 'points' | 'checks' | 'advice'> & {
  readonly points: readonly Written<ControlPoint, 'what'>[];
  readonly checks: readonly Written<Check, 'what'>[];
  readonly advice: readonly Written<Advice, 'text'>[];
};

export function setOutWritten(found: SetOut, display: Display): WrittenSetOut {
  const text = (words: FiguredWords) => figuredText(words, display);
  return {
    ...found,
    points: found.points.map((point) => ({ ...point, what: text(point.what) })),
    checks: found.checks.map((check) => ({ ...check, what: text(check.what) })),
    advice: found.advice.map((advice) => ({ ...advice, text: text(advice.text) })),
  };
}
