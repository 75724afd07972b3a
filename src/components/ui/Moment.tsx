import { useSyncExternalStore } from 'react';
import { dayAndTime, dayOf } from './times';

const never = () => () => {};

/**
 * An instant in the reader's own time. The server does not know which that is: its page says it in UTC, until the
 * reader's browser takes over.
 */
export function Moment({ iso, day = false }: { iso: string; day?: boolean }) {
  const here = useSyncExternalStore(
    never,
    () => true,
    () => false,
  );
  const zone = here ? undefined : 'UTC';
  return (
    <time dateTime={iso} suppressHydrationWarning>
      {day ? dayOf(iso, zone) : dayAndTime(iso, zone)}
    </time>
  );
}
