import { InputError } from "#lib/core/failures/input-error.ts";

/**
 * The text of a UTF-8 file, with or without a byte order mark.
 *
 * @throws InputError `not-text` where the bytes are UTF-16, not UTF-8 or not text at all.
 */
export function decodeText(bytes: Uint8Array, fileName: string): string {
  const [first, second] = bytes;
  if ((first === 0xff && second === 0xfe) || (first === 0xfe && second === 0xff)) {
    throw notText(fileName, "found UTF-16 text; wanted UTF-8. Save the file again as UTF-8");
  }
  if (bytes.includes(0)) throw notText(fileName, "found zero bytes, which no text holds; wanted a UTF-8 text file");
  try {
    return new TextDecoder("utf-8", { fatal: true }).decode(bytes);
  } catch {
    throw notText(fileName, "found bytes that are not UTF-8; wanted a UTF-8 text file. Save the file again as UTF-8");
  }
}

function notText(fileName: string, found: string): InputError {
  return new InputError([{ code: "not-text", path: fileName, message: `${fileName}: ${found}.` }]);
}
