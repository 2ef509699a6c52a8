import { InputError } from "#lib/core/failures/input-error.ts";

/** What the system or the database says, by the start of its code, and what it means for whoever named the folder. */
const REASONS: readonly { readonly code: RegExp; readonly found: string }[] = [
  { code: /^(EEXIST|ENOTDIR)$/, found: "found a file in its place; wanted a folder" },
  { code: /^(EACCES|EPERM|EROFS|SQLITE_READONLY|SQLITE_CANTOPEN)/, found: "found a folder, or a database in it, that may not be written; wanted one that may" },
  { code: /^(ENOSPC|SQLITE_FULL)/, found: "found no room left on its disk" },
  { code: /^SQLITE_BUSY/, found: "found another program using it; wanted one at a time" },
  { code: /^SQLITE_NOTADB/, found: "found an offing.sqlite that is no database of this program" },
  { code: /^SQLITE_CORRUPT/, found: "found a damaged database; wanted a whole one, such as a copy made before a migration" },
];

/** The fault as one of the folder's, in a sentence; null where it is none of the folder's. */
export function unusableFolder(error: unknown, dataDirectory: string): InputError | null {
  const code = error instanceof Error && "code" in error ? String(error.code) : "";
  const reason = REASONS.find((candidate) => candidate.code.test(code));
  if (reason === undefined) return null;
  return new InputError([{ code: "unusable-folder", path: dataDirectory, message: `Data folder ${dataDirectory}: ${reason.found} (${code}).` }]);
}
