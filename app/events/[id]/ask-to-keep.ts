export interface AnswerToKeep {
  readonly eventId: string;
  /** Number of the latest kept answer in view. */
  readonly startedFrom: number;
  readonly leftOut: readonly string[];
  readonly reason: string;
}

export type KeepReport =
  | { readonly kind: "kept"; readonly number: number }
  /** Somebody else kept an answer that is not in view yet. */
  | { readonly kind: "overtaken"; readonly messages: readonly string[] }
  | { readonly kind: "failed"; readonly messages: readonly string[] };

/** Asks the server to keep the answer; never throws, for whatever goes wrong has to be said beside the form. */
export async function askToKeep({ eventId, ...body }: AnswerToKeep): Promise<KeepReport> {
  try {
    const response = await fetch(`/api/v1/events/${encodeURIComponent(eventId)}/localizations`, {
      method: "POST",
      headers: { "content-type": "application/json" },
      body: JSON.stringify(body),
    });
    const reply = (await response.json()) as { number?: number; issues?: readonly { message: string }[] };
    if (response.ok && reply.number !== undefined) return { kind: "kept", number: reply.number };
    const messages = (reply.issues ?? []).map(({ message }) => message);
    if (messages.length === 0) return UNHEARD;
    return { kind: response.status === 409 ? "overtaken" : "failed", messages };
  } catch {
    return UNHEARD;
  }
}

/** Nothing is kept twice by trying again: what was kept meanwhile makes the server refuse. */
const UNHEARD: KeepReport = {
  kind: "failed",
  messages: ["The server did not answer, so whether this was kept is not known. Try again: if it was, the server will say so."],
};
