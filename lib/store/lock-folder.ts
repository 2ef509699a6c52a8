import { join } from "node:path";
import Database from "better-sqlite3";

/**
 * Takes a data folder for this process, and gives what lets go of it again. It is a lock of the operating system, on a
 * file that holds nothing: it ends with the process, however that ends, so none is ever left behind.
 *
 * @throws SqliteError `SQLITE_BUSY` where another process has taken the folder.
 */
export function lockFolder(dataDirectory: string): () => void {
  const lock = new Database(join(dataDirectory, "offing.lock"), { timeout: 0 });
  try {
    // Written to as well, and never committed: a file that may only be read can be locked by any number of programs.
    lock.exec("BEGIN EXCLUSIVE; CREATE TABLE IF NOT EXISTS held (by INTEGER)");
  } catch (error) {
    lock.close();
    throw error;
  }
  return () => lock.close();
}
