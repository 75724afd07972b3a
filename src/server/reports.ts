import type { FieldProblem } from '@/api-types/problem';
import { layFloor, type Laying } from '@/paving/laying';
import type { LayoutDocument } from '@/paving/layout-document';
import { parseLayoutDocument } from '@/paving/layout-validation';
import { floorReport, type Report } from '@/paving/report';
import { done, invalid, type Outcome } from './outcomes';

/** A document that was laid and reported by the server itself. */
export interface ReportedFloor {
  /** As parsed: with defaults filled in and rings anticlockwise. */
  readonly document: LayoutDocument;
  readonly laying: Laying;
  readonly report: Report;
}

/** Lays a document from outside and reports on it, or says everything that is wrong with it. */
export const reportOn = (input: unknown): Outcome<ReportedFloor> => {
  const parsed = parseLayoutDocument(input);
  if (!parsed.ok) {
    const errors: FieldProblem[] = parsed.problems.map((problem) => ({ ...problem }));
    return invalid('This layout cannot be laid as it stands.', errors);
  }
  const { document } = parsed;
  const laying = layFloor(document);
  return done({ document, laying, report: floorReport(laying) });
};
