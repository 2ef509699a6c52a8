/**
 * Where a tab puts its unsaved work aside on this device, under a name of its own, so that two tabs at one thing do not
 * wipe out each other's. A tab that opens takes over the newest work that no open tab holds.
 */
export interface DraftShelf {
  /** What was found there; null for none. */
  readonly found: string | null;
  /** Null forgets it. Gives whether the browser took it: it may be full, or told to remember nothing. */
  readonly put: (text: string | null) => boolean;
  readonly close: () => void;
}

/** Long enough for another tab to answer, short enough not to be waited for; of two that open at once one comes first. */
const LEAST_WAIT_MILLISECONDS = 120;
const MOST_WAIT_MILLISECONDS = 240;

interface Kept {
  readonly at: number;
  readonly text: string;
}

type Message = { readonly kind: "who-holds" } | { readonly kind: "held"; readonly key: string };

/** `subject` says what the work is about, and in which data folder. */
export async function openShelf(subject: string): Promise<DraftShelf> {
  const prefix = `offing.draft ${subject} `;
  const channel = openChannel(prefix);
  const others = new Set<string>();
  const own = { key: prefix + crypto.getRandomValues(new Uint32Array(2)).join("-") };
  channel?.addEventListener("message", ({ data }: MessageEvent<Message>) => {
    if (data.kind === "held") others.add(data.key);
    else say(channel, { kind: "held", key: own.key });
  });
  if (channel !== null && keptUnder(prefix).length > 0) {
    say(channel, { kind: "who-holds" });
    const wait = LEAST_WAIT_MILLISECONDS + Math.random() * (MOST_WAIT_MILLISECONDS - LEAST_WAIT_MILLISECONDS);
    await new Promise((resolve) => setTimeout(resolve, wait));
  }
  const [newest] = keptUnder(prefix).filter(({ key }) => !others.has(key)).sort((a, b) => b.at - a.at);
  if (newest !== undefined) own.key = newest.key;
  if (channel !== null) say(channel, { kind: "held", key: own.key });
  return { found: newest?.text ?? null, put: (text) => put(own.key, text), close: () => { channel?.close(); } };
}

function openChannel(name: string): BroadcastChannel | null {
  return typeof BroadcastChannel === "undefined" ? null : new BroadcastChannel(name);
}

function say(channel: BroadcastChannel, message: Message): void {
  channel.postMessage(message);
}

function keptUnder(prefix: string): (Kept & { key: string })[] {
  try {
    const keys = Object.keys(globalThis.localStorage).filter((key) => key.startsWith(prefix));
    return keys.flatMap((key) => {
      const kept = readKept(globalThis.localStorage.getItem(key));
      return kept === null ? [] : [{ key, ...kept }];
    });
  } catch {
    return []; // a browser that keeps nothing
  }
}

function readKept(json: string | null): Kept | null {
  try {
    const kept = JSON.parse(json ?? "null") as Partial<Kept> | null;
    return typeof kept?.at === "number" && typeof kept.text === "string" ? { at: kept.at, text: kept.text } : null;
  } catch {
    return null;
  }
}

function put(key: string, text: string | null): boolean {
  try {
    if (text === null) globalThis.localStorage.removeItem(key);
    else globalThis.localStorage.setItem(key, JSON.stringify({ at: Date.now(), text } satisfies Kept));
    return true;
  } catch {
    return false;
  }
}
