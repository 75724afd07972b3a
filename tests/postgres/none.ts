import type { TestProject } from 'vitest/node';

/** For the tests that run on PGlite. */
export default function setup(project: TestProject) {
  project.provide('postgres', null);
}
