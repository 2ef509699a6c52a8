import { z } from "zod";
import type { LocalizationSummary, LocalizationToSave, StoredLocalization } from "#lib/application/ports.ts";
import { NO_CHOICES } from "#lib/core/arrival/observation-choices.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import type { SourceOutcome } from "#lib/core/source/answer.ts";
import { wrapLongitudeDegrees } from "#lib/core/units/position.ts";
import { addToAudit } from "./audit.ts";
import { requireEvent, requireUnmerged } from "./event-change.ts";
import type { Localization, Prisma, PrismaClient } from "./generated/client.ts";
import { requireRevision } from "./stale.ts";

/** Saves within a transaction that the caller has opened; see `LocalizationStore.saveLocalization`. */
export async function saveLocalization(transaction: Prisma.TransactionClient, localization: LocalizationToSave): Promise<number> {
  const { eventId, startedFrom, choices, source, settingsJson, inputJson, answerJson, ...plain } = localization;
  const { leftOutStationIds: leftOut, ...others } = choices;
  const event = await requireEvent(transaction, eventId);
  requireUnmerged(event);
  await requireLatest(transaction, eventId, startedFrom);
  const number = startedFrom + 1;
  requireRevision(`Event "${eventId}"`, event, plain.eventRevision);

  await transaction.localization.create({
    data: {
      ...plain,
      eventId,
      number,
      settings: settingsJson,
      input: inputJson,
      answer: answerJson,
      leftOut: JSON.stringify(leftOut),
      choices: JSON.stringify(others),
      latitudeDegrees: source?.position.latitudeDegrees ?? null,
      longitudeDegrees: source ? wrapLongitudeDegrees(source.position.longitudeDegrees) : null,
      originEpochSeconds: source?.originEpochSeconds ?? null,
    },
  });
  const detail = { number, outcome: plain.outcome, inputDigest: plain.inputDigest, choices };
  await addToAudit(transaction, plain, { action: "localization saved", subject: `event ${eventId}`, detail });
  return number;
}

export async function requireLatest(reader: Pick<PrismaClient, "localization">, eventId: string, startedFrom: number): Promise<void> {
  const latest = await reader.localization.findFirst({ where: { eventId }, orderBy: { number: "desc" }, select: { number: true, savedEpochSeconds: true, actor: true } });
  if ((latest?.number ?? 0) !== startedFrom) throw stale(eventId, startedFrom, latest);
}

function stale(eventId: string, startedFrom: number, latest: Pick<Localization, "number" | "savedEpochSeconds" | "actor"> | null): Refusal {
  if (latest === null || latest.number < startedFrom) {
    return new Refusal("conflict", `Event "${eventId}" has ${String(latest?.number ?? 0)} localizations; this one says it started from number ${String(startedFrom)}.`);
  }
  const since = `${new Date(latest.savedEpochSeconds * 1000).toISOString().slice(0, 16)}Z`;
  return new Refusal("conflict", `Number ${String(latest.number)} of event "${eventId}" was kept by ${latest.actor} at ${since}; this one started from number ${String(startedFrom)}.`);
}

export async function listLocalizations(reader: PrismaClient, eventId: string): Promise<LocalizationSummary[]> {
  const rows = await reader.localization.findMany({
    where: { eventId },
    orderBy: { number: "desc" },
    omit: { input: true, answer: true },
  });
  return rows.map(summaryFromRow);
}

export async function loadLocalization(reader: PrismaClient, eventId: string, number: number): Promise<StoredLocalization | null> {
  const row = await reader.localization.findUnique({ where: { eventId_number: { eventId, number } } });
  return row && { ...summaryFromRow(row), inputJson: row.input, answerJson: row.answer };
}

function summaryFromRow(row: Omit<Localization, "input" | "answer">): LocalizationSummary {
  const { eventId, eventRevision, savedEpochSeconds, actor, reason, program, nodeVersion, inputDigest } = row;
  return {
    ...{ eventId, eventRevision, savedEpochSeconds, actor, reason, program, nodeVersion, inputDigest },
    ...placedSummary(row),
    settingsJson: row.settings,
    choices: { ...NO_CHOICES, ...Choices.parse(JSON.parse(row.choices)), leftOutStationIds: LeftOut.parse(JSON.parse(row.leftOut)) },
  };
}

const LeftOut = z.array(z.string());
const Choices = z.object({
  droppedReadingIds: z.array(z.number()),
  movedReadings: z.array(z.object({ readingId: z.number(), arrivalEpochSeconds: z.number(), frequencyHz: z.number() })),
  addedReadings: z.array(
    z.object({
      stationId: z.string(),
      arrivalEpochSeconds: z.number(),
      frequencyHz: z.number(),
      arrivalSigmaSeconds: z.number(),
      frequencySigmaHz: z.number(),
      kind: z.enum(["ridge", "timed"]),
    }),
  ),
  usesSuspect: z.boolean(),
});

/** What a kept answer came to, from the columns that say so. */
export function placedSummary(row: Pick<Localization, "number" | "outcome" | "latitudeDegrees" | "longitudeDegrees" | "originEpochSeconds">) {
  const { number, latitudeDegrees, longitudeDegrees, originEpochSeconds } = row;
  const isPlaced = latitudeDegrees !== null && longitudeDegrees !== null && originEpochSeconds !== null;
  return {
    number,
    outcome: row.outcome as SourceOutcome,
    source: isPlaced ? { position: { latitudeDegrees, longitudeDegrees }, originEpochSeconds } : null,
  };
}
