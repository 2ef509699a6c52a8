import type { StationsReportJson } from "#lib/contracts/api/stations.ts";

export type TakenIn =
  | { readonly kind: "report"; readonly report: StationsReportJson }
  /** The stations were changed since the preview. */
  | { readonly kind: "overtaken"; readonly messages: readonly string[] }
  | { readonly kind: "faulty"; readonly messages: readonly string[] };

const UNHEARD: TakenIn = { kind: "faulty", messages: ["The server did not answer, so whether anything was stored is not known. Try again: what was stored already is then found unchanged."] };

/** Asks for a preview (no token), or to store what was previewed; never throws, for whatever goes wrong has to be said on the page. The bytes go as they are: what is no UTF-8 the server says. */
export async function askToTakeIn(bytes: ArrayBuffer, token: string | null): Promise<TakenIn> {
  try {
    const query = token === null ? "preview=yes" : `token=${token}`;
    const response = await fetch(`/api/v1/stations.csv?${query}`, { method: "POST", headers: { "content-type": "text/csv" }, body: bytes });
    const reply = (await response.json()) as StationsReportJson & { issues?: readonly { message: string }[] };
    if (response.ok) return { kind: "report", report: reply };
    const messages = (reply.issues ?? []).map(({ message }) => rowFirst(message)).sort((a, b) => rowOf(a) - rowOf(b));
    if (messages.length === 0) return UNHEARD;
    return { kind: response.status === 409 ? "overtaken" : "faulty", messages };
  } catch {
    return UNHEARD;
  }
}

/** What names no row stands first where it is about the whole file, and last where it only counts the rest. */
function rowOf(message: string): number {
  const row = /^Row (\d+)/.exec(message)?.[1];
  return row !== undefined ? Number(row) : message.includes(" more problems ") ? Number.MAX_SAFE_INTEGER : 0;
}

/** The page shows one file, and names it above: "Row 3, column to: ..." */
function rowFirst(message: string): string {
  const rest = message.replace(/^stations\.csv[,:] /, "");
  return rest.charAt(0).toUpperCase() + rest.slice(1);
}
