import type { Environment } from '@/server/environment';
import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/server/demo-people';

/** The demo sign-ins as lines of text. */
export const demoSignIns = (): string => {
  const lines = DEMO_PEOPLE.map(({ role, email }) => `    ${role.padEnd(10)} ${email}`);
  return `  Demo sign-ins, all with the password ${DEMO_PASSWORD}\n${lines.join('\n')}`;
};

/** Where letters go, so that nobody waits for one that is not sent. */
export const whereLettersGo = (
  { smtpUrl, publicOrigin, dataDir }: Environment,
  origin: string,
): string => {
  if (smtpUrl) {
    return `Letters are sent through ${new URL(smtpUrl).host}${
      publicOrigin ? '' : `. Their links lead to ${origin}: set PUBLIC_ORIGIN to what people use`
    }`;
  }
  return publicOrigin
    ? `No mail server is set (SMTP_URL): letters are not sent, but kept in ${dataDir}/mail`
    : `Letters are not sent, but kept, and shown at ${origin}/dev/mail. SMTP_URL names a server that sends them`;
};

/** Says what went wrong in one line, without a stack, and ends. */
export const endWith = (error: unknown): never => {
  process.stderr.write(`\n${error instanceof Error ? error.message : String(error)}\n`);
  process.exit(1);
};
