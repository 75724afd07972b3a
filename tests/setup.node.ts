import { afterEach, beforeEach, expect, vi } from 'vitest';

// A message on console.error is a failure: nothing in the project may log an error unseen.
beforeEach(() => {
  vi.spyOn(console, 'error');
});

afterEach(() => {
  const calls = vi.mocked(console.error).mock.calls;
  vi.restoreAllMocks();
  expect(calls, 'console.error was called').toEqual([]);
});
