import { createHash } from "node:crypto";
import canonicalize from "canonicalize";
import type { EventObservations } from "#lib/core/arrival/observations.ts";

/** SHA-256, in hexadecimal, over the canonical JSON (RFC 8785) of what was read from the files of one event. */
export function inputDigest(observations: EventObservations): string {
  const { deployments, readings, estimates } = observations;
  const text = canonicalize({ deployments, readings, estimates });
  if (text === undefined) throw new Error("Observations have no canonical JSON.");
  return createHash("sha256").update(text, "utf8").digest("hex");
}
