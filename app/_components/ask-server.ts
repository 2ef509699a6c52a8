export interface Issue {
  readonly path: string;
  readonly message: string;
}

/** What came of asking the server: its reply, or why not, in sentences. */
export type Asked<Reply> =
  | { readonly kind: "done"; readonly reply: Reply }
  /** Somebody else changed meanwhile what is in view here. */
  | { readonly kind: "overtaken"; readonly issues: readonly Issue[] }
  | { readonly kind: "failed"; readonly issues: readonly Issue[] };

/**
 * Asks the programming interface; never throws, for whatever goes wrong has to be said where it was asked. `unheard`
 * says what the reader should make of a server that did not answer.
 */
export async function askServer<Reply>(path: string, { method = "GET", body, unheard }: { method?: string; body?: unknown; unheard: string }): Promise<Asked<Reply>> {
  const silence = { kind: "failed", issues: [{ path: "", message: unheard }] } as const;
  try {
    const init = body === undefined ? { method } : { method, headers: { "content-type": "application/json" }, body: JSON.stringify(body) };
    const response = await fetch(path, init);
    const reply = (await response.json()) as Reply & { issues?: readonly Issue[] };
    if (response.ok) return { kind: "done", reply };
    if (reply.issues === undefined || reply.issues.length === 0) return silence;
    return { kind: response.status === 409 ? "overtaken" : "failed", issues: reply.issues };
  } catch {
    return silence;
  }
}
