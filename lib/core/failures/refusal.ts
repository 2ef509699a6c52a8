export type RefusalReason = "not-found" | "conflict" | "forbidden" | "too-large" | "too-many" | "cannot-store";

/** The request is well formed and still cannot be granted. One table (lib/contracts/api/refusal-status.ts) maps reasons to statuses. */
export class Refusal extends Error {
  readonly reason: RefusalReason;

  constructor(reason: RefusalReason, message: string) {
    super(message);
    this.name = "Refusal";
    this.reason = reason;
  }
}
