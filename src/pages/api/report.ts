import { reportRequestSchema } from '@/api-types/layouts';
import { onlyMethods, writing } from '@/server/endpoint';
import { done } from '@/server/outcomes';
import { reportOn } from '@/server/reports';

export const POST = writing(reportRequestSchema, async (_call, { document }) => {
  const reported = reportOn(document);
  return reported.ok ? done({ report: reported.value.report }) : reported;
});
export const ALL = onlyMethods('POST');
