import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef, useState } from 'react';
import type { LiveState } from '@/api-types/live';
import { liveChanges } from './live-changes';
import { liveConnected } from './live-connection';

/**
 * Keeps an island's queries fresh: those of what changed are asked again. Keys: `['version', id]`, `['agreement', id]`, `['choices', projectId]`,
 * `['threads', id]`, `['on-site', id]`, `['versions', layoutId]`, `['project', id]`, `['timeline', …]`. Gives how the project stands.
 */
export function useLiveRefresh(projectId: string): { state: LiveState | null; gone: boolean } {
  const queries = useQueryClient();
  const [state, setState] = useState<LiveState | null>(null);
  const [gone, setGone] = useState(false);
  const last = useRef<LiveState | null>(null);
  useEffect(
    () =>
      liveConnected(
        projectId,
        (now) => {
          const before = last.current;
          last.current = now;
          setState(now);
          if (!before || before.stamp === now.stamp) return;
          const { layouts, versions, comments, site, choices } = liveChanges(before, now);
          const refresh = (...queryKey: string[]) => void queries.invalidateQueries({ queryKey });
          for (const id of layouts) refresh('versions', id);
          for (const id of versions) {
            refresh('version', id);
            refresh('agreement', id);
          }
          for (const id of comments) refresh('threads', id);
          for (const id of site) refresh('on-site', id);
          // Whether a version can be accepted hangs on the choices.
          if (choices) refresh('agreement');
          if (choices || versions.length > 0) refresh('choices', projectId);
          if (layouts.length + versions.length > 0) {
            refresh('project', projectId);
            if (versions.length > 0) refresh('versions');
          }
          if (layouts.length + versions.length + comments.length > 0) refresh('timeline');
        },
        () => setGone(true),
      ),
    [projectId, queries],
  );
  return { state, gone };
}
