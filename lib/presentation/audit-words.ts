import { counted, listWords } from "./numbers-in-words.ts";
import { QUALITY_WORDS } from "./quality-words.ts";
import { momentWords } from "./times.ts";

/** A line of an event's audit trail. */
export interface AuditLine {
  readonly savedEpochSeconds: number;
  readonly actor: string;
  readonly action: string;
  readonly detail: unknown;
}

/** "1 Dec 2031 06:00 UTC, somebody: the arrival of ott came from petrel." */
export function auditWords({ savedEpochSeconds, actor, action, detail }: AuditLine, eventId: string): string {
  return `${momentWords(savedEpochSeconds)}, ${actor}: ${whatWords(action, detail as Detail, eventId)}.`;
}

/** What the store writes beside the actions that are told here. */
interface Detail {
  readonly station?: string;
  readonly from?: string | null;
  readonly to?: string | null;
  readonly into?: string;
  readonly arrivals?: readonly number[] | number;
  readonly number?: number;
  readonly readings?: number;
  readonly stations?: readonly string[];
  readonly before?: unknown;
  readonly after?: unknown;
}

function whatWords(action: string, detail: Detail, eventId: string): string {
  const { station = "a station", from, to, into, number, before, after } = detail;
  const count = Array.isArray(detail.arrivals) ? detail.arrivals.length : 0;
  switch (action) {
    case "event saved":
      return "made the event";
    case "event described":
      return "gave it another title or note";
    case "localization saved":
      return `kept answer ${String(number)}`;
    case "arrival brought in":
      return `brought in an arrival at ${station}`;
    case "arrival moved":
      return to === eventId ? `took in the arrival at ${station} from ${from ?? "those waiting"}` : `moved the arrival at ${station} to ${to ?? "those waiting"}`;
    case "arrivals moved":
    case "event split":
      return `moved ${counted(count, "arrival")} to ${to ?? "another event"}`;
    case "events merged":
      return into === eventId ? `took in ${counted(count, "arrival")} of ${from ?? "another event"}` : `merged it into ${into ?? "another event"}`;
    case "stations described anew":
      return `described ${listWords(detail.stations ?? [])} anew`;
    case "reading flagged":
      return `flagged a reading of ${station} ${flagWords(after)}, ${flagWords(before)} before`;
    default:
      return action;
  }
}

/** The other event that a line speaks of; null where it speaks of none. */
export function otherEvent({ detail }: AuditLine, eventId: string): string | null {
  const { from, to, into } = detail as Detail;
  return [to, into, from].find((id) => typeof id === "string" && id !== eventId) ?? null;
}

function flagWords(flag: unknown): string {
  return QUALITY_WORDS.find(([value]) => value === flag)?.[1] ?? String(flag);
}
