import { Fragment } from 'react';
import { figuredParts, type FiguredWords as Words } from '@/paving/figured-words';
import type { Display } from '@/paving/length';
import { Length } from './Length';

/** A sentence with its lengths as the reader's tape has them. */
export function FiguredWords({ words, display }: { words: Words; display: Display }) {
  return figuredParts(words, display).map((part, n) =>
    'text' in part ? (
      <Fragment key={n}>{part.text}</Fragment>
    ) : (
      <Length key={n} mm={part.mm} display={display} decimals={part.decimals} />
    ),
  );
}
