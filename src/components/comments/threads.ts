import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type {
  Mentionable,
  NewComment,
  NewReply,
  Thread,
  ThreadChange,
  ThreadRead,
  Threads,
} from '@/api-types/comments';
import { api } from '../ui/api';

export const useThreads = (versionId: string) =>
  useQuery({
    queryKey: ['threads', versionId],
    queryFn: () =>
      api<Threads>('GET', `/api/versions/${versionId}/comments`).then(({ threads }) => threads),
  });

export const useMentionable = (versionId: string) =>
  useQuery({
    queryKey: ['mentionable', versionId],
    queryFn: () =>
      api<{ people: Mentionable[] }>('GET', `/api/versions/${versionId}/mentionable`).then(
        ({ people }) => people,
      ),
    staleTime: 60_000,
  });

/** What can be done in the threads of a version; each answer takes the thread's place in the list. */
export function useThreadActions(versionId: string) {
  const queries = useQueryClient();
  const placed = (thread: Thread) =>
    queries.setQueryData<readonly Thread[]>(['threads', versionId], (before = []) =>
      before.some(({ id }) => id === thread.id)
        ? before.map((each) => (each.id === thread.id ? thread : each))
        : [...before, thread],
    );
  const options = { networkMode: 'always', onSuccess: placed } as const;
  return {
    begin: useMutation({
      ...options,
      mutationFn: (body: NewComment) =>
        api<Thread>('POST', `/api/versions/${versionId}/comments`, body),
    }),
    reply: useMutation({
      ...options,
      mutationFn: ({ id, ...body }: NewReply & { id: string }) =>
        api<Thread>('POST', `/api/threads/${id}/replies`, body),
    }),
    change: useMutation({
      ...options,
      mutationFn: ({ id, ...body }: ThreadChange & { id: string }) =>
        api<Thread>('PATCH', `/api/threads/${id}`, body),
    }),
    read: useMutation({
      ...options,
      mutationFn: ({ id, ...body }: ThreadRead & { id: string }) =>
        api<Thread>('PUT', `/api/threads/${id}/read`, body),
    }),
  };
}

/** Pins are numbered in the order of their threads, on the floor and in the list alike. */
export const pinNumbers = (threads: readonly Thread[]): ReadonlyMap<string, number> =>
  new Map(threads.filter(({ pin }) => pin).map(({ id }, n) => [id, n + 1]));
