import { readFileSync, statSync } from "node:fs";
import { resolve } from "node:path";
import { InputError } from "#lib/core/failures/input-error.ts";
import type { TextFile } from "#lib/records/event-files.ts";
import { decodeText } from "#lib/records/text.ts";

/** A file of a million readings has some 50 MB; what is far beyond that is not one. */
const LARGEST_FILE_BYTES = 256e6;

/**
 * The text of a file that the caller named, under the name that the caller used.
 *
 * @throws InputError where it cannot be read or is not text.
 */
export function readTextFile({ path, folder }: { readonly path: string; readonly folder: string }): TextFile {
  return { fileName: path, text: decodeText(readBytes(resolve(folder, path), path), path) };
}

/** @throws InputError where the file is not JSON. */
export function readJsonFile(file: { readonly path: string; readonly folder: string }): unknown {
  const { text, fileName } = readTextFile(file);
  try {
    return JSON.parse(text.replace(/^\uFEFF/, ""));
  } catch {
    throw unreadable(fileName, "not-json", "found text that is not JSON; wanted an object of settings");
  }
}

function readBytes(path: string, name: string): Uint8Array {
  try {
    const { size } = statSync(path);
    if (size > LARGEST_FILE_BYTES) throw unreadable(name, "too-large", `found ${size} bytes; wanted at most ${LARGEST_FILE_BYTES}`);
    return readFileSync(path);
  } catch (error) {
    if (error instanceof InputError) throw error;
    const code = error instanceof Error && "code" in error ? String(error.code) : "unknown";
    throw unreadable(name, "cannot-read", `found ${REASONS[code] ?? `a fault on reading it (${code})`}; wanted a file that can be read`);
  }
}

const REASONS: Readonly<Record<string, string>> = {
  ENOENT: "no such file",
  ENOTDIR: "no such file",
  EISDIR: "a folder",
  EACCES: "a file that may not be read",
  EPERM: "a file that may not be read",
};

function unreadable(name: string, code: string, found: string): InputError {
  return new InputError([{ code, path: name, message: `${name}: ${found}.` }]);
}
