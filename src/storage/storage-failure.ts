import { StorageUnavailable } from './storage-unavailable.js';

/** What each family of database codes means to the person at the keyboard: message and next step. */
const meanings: readonly (readonly [RegExp, (file: string) => readonly [string, string]])[] = [
  [
    /^SQLITE_(BUSY|LOCKED)/,
    (file) => [
      `The database ${file} is locked by another program.`,
      'Close the other program that has it open (a second Stillair, a backup, a database viewer), then try again.',
    ],
  ],
  [
    /^SQLITE_READONLY|^EACCES|^EROFS|^EPERM/,
    (file) => [
      `The database ${file} may not be written.`,
      'Give the account that runs Stillair write access to the file and to its folder, or set DATABASE_URL to a place that it may write.',
    ],
  ],
  [
    /^SQLITE_FULL|^ENOSPC|^EDQUOT/,
    (file) => [
      `There is no room left on the disk that holds ${file}; nothing was changed.`,
      'Free some space on that disk, then save again.',
    ],
  ],
  [
    /^SQLITE_(CORRUPT|NOTADB)/,
    (file) => [
      `The file ${file} is damaged or is not a database.`,
      'Leave the file as it is, copy it somewhere safe, and put a backup in its place; or set DATABASE_URL to another file.',
    ],
  ],
  [
    /^SQLITE_CANTOPEN|^ENOTDIR|^ENOENT|^EEXIST|^EISDIR/,
    (file) => [
      `The database ${file} cannot be opened.`,
      'Check that DATABASE_URL names a file in a folder that exists or can be created, and that the folder may be written.',
    ],
  ],
  [
    /^SQLITE_IOERR|^EIO/,
    (file) => [
      `Reading or writing ${file} failed on the disk.`,
      'Check the disk and its connection; what was saved before is untouched.',
    ],
  ],
];

function textAt(value: unknown, ...keys: readonly string[]): string | undefined {
  let here = value;
  for (const key of keys) {
    if (typeof here !== 'object' || here === null) return undefined;
    here = (here as Record<string, unknown>)[key];
  }
  return typeof here === 'string' ? here : undefined;
}

/** The code the database driver or the file system gave, through the layers that wrap it. */
function driverCode(error: unknown): string | undefined {
  return (
    textAt(error, 'meta', 'driverAdapterError', 'cause', 'originalCode') ??
    textAt(error, 'cause', 'originalCode') ??
    textAt(error, 'code')
  );
}

/** The same failure in words, when it is one that a person can act on; otherwise the error itself. */
export function storageFailure(error: unknown, file: string): unknown {
  const code = driverCode(error);
  const meaning = meanings.find(([pattern]) => code !== undefined && pattern.test(code));
  if (meaning === undefined) return error;
  const [message, hint] = meaning[1](file);
  return new StorageUnavailable(message, hint, { cause: error });
}
