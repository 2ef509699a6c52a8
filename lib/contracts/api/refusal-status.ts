import type { RefusalReason } from "#lib/core/failures/refusal.ts";

/** What a refusal is over HTTP. */
export const REFUSAL_STATUS = { "not-found": 404, conflict: 409, forbidden: 403, "too-large": 413, "too-many": 429, "cannot-store": 503 } as const satisfies Record<RefusalReason, number>;
