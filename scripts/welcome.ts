import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/server/demo-people';

/** The demo sign-ins as lines of text. */
export const demoSignIns = (): string => {
  const lines = DEMO_PEOPLE.map(({ role, email }) => `    ${role.padEnd(10)} ${email}`);
  return `  Demo sign-ins, all with the password ${DEMO_PASSWORD}\n${lines.join('\n')}`;
};

/** Says what went wrong in one line, without a stack, and ends. */
export const endWith = (error: unknown): never => {
  process.stderr.write(`\n${error instanceof Error ? error.message : String(error)}\n`);
  process.exit(1);
};
