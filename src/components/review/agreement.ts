import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type {
  AcceptanceRecord,
  AcceptVersion,
  Agreement,
  AskChange,
  IssueVersion,
  ShareVersion,
} from '@/api-types/agreement';
import type { VersionDetail } from '@/api-types/versions';
import { api } from '../ui/api';

export const useAgreement = (versionId: string) =>
  useQuery({
    queryKey: ['agreement', versionId],
    queryFn: () => api<Agreement>('GET', `/api/versions/${versionId}/agreement`),
  });

/** The steps in a version's life. After any of them, everything about the version is asked for anew. */
export function useSteps(versionId: string) {
  const queries = useQueryClient();
  const refreshed = () =>
    Promise.all(
      [['agreement', versionId], ['version', versionId], ['threads', versionId], ['versions']].map(
        (queryKey) => queries.invalidateQueries({ queryKey }),
      ),
    );
  // Also after a refusal: what was refused may have been decided by somebody else meanwhile.
  const options = { networkMode: 'always', onSettled: refreshed } as const;
  const path = `/api/versions/${versionId}`;
  return {
    share: useMutation({
      ...options,
      mutationFn: (body: ShareVersion) => api<VersionDetail>('POST', `${path}/share`, body),
    }),
    accept: useMutation({
      ...options,
      mutationFn: (body: AcceptVersion) => api<AcceptanceRecord>('POST', `${path}/accept`, body),
    }),
    askChange: useMutation({
      ...options,
      mutationFn: (body: AskChange) => api<VersionDetail>('POST', `${path}/ask-change`, body),
    }),
    issue: useMutation({
      ...options,
      mutationFn: (body: IssueVersion) => api<VersionDetail>('POST', `${path}/issue`, body),
    }),
  };
}
