import { InputError } from "#lib/core/failures/input-error.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";

/** As much of a body that is too large is let run by, for a sender that is cut off while it sends never hears why. */
const MOST_LET_BY = 100_000_000;

/**
 * A request's body as text. No more of it is held than it may be long.
 *
 * @throws Refusal `too-large`; InputError `not-whole` where its sender went away, `not-text` where the bytes are not UTF-8.
 */
export async function readText(request: Request, mostBytes: number): Promise<string> {
  const bytes = await readBytes(request, mostBytes);
  try {
    return new TextDecoder("utf-8", { fatal: true }).decode(bytes);
  } catch {
    throw new InputError([{ code: "not-text", path: "", message: "The request's body is no UTF-8 text." }]);
  }
}

async function readBytes(request: Request, mostBytes: number): Promise<Buffer> {
  const parts: Uint8Array[] = [];
  let length = 0;
  const reader = request.body?.getReader();
  const next = () => reader?.read().catch(() => cutOff());
  for (let part = await next(); part?.done === false; part = await next()) {
    length += part.value.byteLength;
    if (length <= mostBytes) parts.push(part.value);
    if (length > MOST_LET_BY) await reader?.cancel();
  }
  if (length > mostBytes) throw new Refusal("too-large", `The request holds more than ${mostBytes} bytes.`);
  return Buffer.concat(parts);
}

/** No fault of the program's, and nobody is left to read this; it keeps the log to real ones. */
function cutOff(): never {
  throw new InputError([{ code: "not-whole", path: "", message: "The request's body ended before it was whole." }]);
}

/** No request has a fifth of it; a value nested without end would overflow whatever walks through it. */
const MOST_DEPTH = 20;

/** @throws InputError `not-json` where it is none, `too-deep` where lists and objects stand in one another without end. */
export function parseJson(text: string): unknown {
  const value = parsed(text);
  if (isDeeperThan(MOST_DEPTH, value)) {
    throw new InputError([{ code: "too-deep", path: "", message: `The request's body holds lists or objects more than ${MOST_DEPTH} deep in one another.` }]);
  }
  return value;
}

function parsed(text: string): unknown {
  try {
    return JSON.parse(text) as unknown;
  } catch {
    throw new InputError([{ code: "not-json", path: "", message: "The request's body is no JSON." }]);
  }
}

function isDeeperThan(most: number, value: unknown): boolean {
  let level = [value];
  for (let depth = 0; depth <= most && level.length > 0; depth += 1) {
    level = level.flatMap((item): unknown[] => (typeof item === "object" && item !== null ? Object.values(item) : []));
  }
  return level.length > 0;
}
