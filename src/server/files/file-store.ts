/**
 * Where files are kept: photos, and whatever else is not rows. Names are paths such as `firm/photos/id-full.jpg`,
 * of letters, digits, dots, dashes and slashes; they are never made from what people type.
 */
export interface FileStore {
  /** Keeps a file under a name, in the place of one that is there. */
  readonly put: (name: string, bytes: Uint8Array, type: string) => Promise<void>;
  /** Null when there is none of that name. */
  readonly get: (name: string) => Promise<Uint8Array | null>;
}

const NAME = /^[a-z0-9_-]+(\/[A-Za-z0-9._-]+)+$/;

/** @throws Error on a name that could lead elsewhere */
export const checkedName = (name: string): string => {
  if (!NAME.test(name) || name.split('/').some((part) => part === '.' || part === '..')) {
    throw new Error(`"${name}" is no name for a file`);
  }
  return name;
};
