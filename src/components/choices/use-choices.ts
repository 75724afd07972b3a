import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { ClientChoices, PickedChoices } from '@/api-types/choices';
import { api } from '../ui/api';

const path = (projectId: string) => `/api/projects/${projectId}/choices`;

export const useChoices = (projectId: string) =>
  useQuery({
    queryKey: ['choices', projectId],
    queryFn: () => api<ClientChoices>('GET', path(projectId)),
  });

/** Picking anew what a client chooses from, and leaving it at every shared version. */
export function usePicking(projectId: string) {
  const queries = useQueryClient();
  const options = {
    networkMode: 'always',
    onSuccess: (now: ClientChoices) => {
      queries.setQueryData(['choices', projectId], now);
      void queries.invalidateQueries({ queryKey: ['agreement'] });
    },
  } as const;
  return {
    pick: useMutation({
      ...options,
      mutationFn: (picked: PickedChoices) => api<ClientChoices>('PUT', path(projectId), picked),
    }),
    all: useMutation({
      ...options,
      mutationFn: () => api<ClientChoices>('DELETE', path(projectId)),
    }),
  };
}
