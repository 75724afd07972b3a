import { existsSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

/**
 * The folder of the generated migrations: the nearest `drizzle/` above this module, which is the
 * project's both from the sources and from the built server, wherever the process was started.
 */
export const migrationsFolder = (): string => {
  let folder = path.dirname(fileURLToPath(import.meta.url));
  for (;;) {
    const candidate = path.join(folder, 'drizzle');
    if (existsSync(path.join(candidate, 'meta', '_journal.json'))) return candidate;
    const parent = path.dirname(folder);
    if (parent === folder) {
      throw new Error(
        `No folder "drizzle" with migrations above ${fileURLToPath(import.meta.url)}`,
      );
    }
    folder = parent;
  }
};
