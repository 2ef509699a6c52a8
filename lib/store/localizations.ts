import type { LocalizationSummary, LocalizationToSave, StoredLocalization } from "#lib/application/ports.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import type { SourceOutcome } from "#lib/core/source/answer.ts";
import { wrapLongitudeDegrees } from "#lib/core/units/position.ts";
import type { Localization, Prisma, PrismaClient } from "./generated/client.ts";

/** Saves within a transaction that the caller has opened; see `LocalizationStore.saveLocalization`. */
export async function saveLocalization(transaction: Prisma.TransactionClient, localization: LocalizationToSave): Promise<number> {
  const { eventId, startedFrom, leftOut, source, settingsJson, inputJson, answerJson, ...plain } = localization;
  if ((await transaction.event.findUnique({ where: { id: eventId } })) === null) {
    throw new Refusal("not-found", `No event "${eventId}" is stored.`);
  }
  const latest = await transaction.localization.findFirst({ where: { eventId }, orderBy: { number: "desc" } });
  const number = (latest?.number ?? 0) + 1;
  if (number !== startedFrom + 1) throw stale(eventId, startedFrom, latest);

  await transaction.localization.create({
    data: {
      ...plain,
      eventId,
      number,
      settings: settingsJson,
      input: inputJson,
      answer: answerJson,
      leftOut: JSON.stringify(leftOut),
      latitudeDegrees: source?.position.latitudeDegrees ?? null,
      longitudeDegrees: source ? wrapLongitudeDegrees(source.position.longitudeDegrees) : null,
      originEpochSeconds: source?.originEpochSeconds ?? null,
    },
  });
  await transaction.auditEntry.create({
    data: {
      atEpochSeconds: plain.savedEpochSeconds,
      actor: plain.actor,
      action: "localization saved",
      subject: `event ${eventId}`,
      detail: JSON.stringify({ number, outcome: plain.outcome, inputDigest: plain.inputDigest, leftOut }),
    },
  });
  return number;
}

function stale(eventId: string, startedFrom: number, latest: Localization | null): Refusal {
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
    omit: { settings: true, input: true, answer: true },
  });
  return rows.map(summaryFromRow);
}

export async function loadLocalization(reader: PrismaClient, eventId: string, number: number): Promise<StoredLocalization | null> {
  const row = await reader.localization.findUnique({ where: { eventId_number: { eventId, number } } });
  return row && { ...summaryFromRow(row), settingsJson: row.settings, inputJson: row.input, answerJson: row.answer };
}

function summaryFromRow(row: Omit<Localization, "settings" | "input" | "answer">): LocalizationSummary {
  const { eventId, number, savedEpochSeconds, actor, reason, program, nodeVersion, inputDigest } = row;
  const { latitudeDegrees, longitudeDegrees, originEpochSeconds } = row;
  const isPlaced = latitudeDegrees !== null && longitudeDegrees !== null && originEpochSeconds !== null;
  return {
    ...{ eventId, number, savedEpochSeconds, actor, reason, program, nodeVersion, inputDigest },
    leftOut: JSON.parse(row.leftOut) as string[],
    outcome: row.outcome as SourceOutcome,
    source: isPlaced ? { position: { latitudeDegrees, longitudeDegrees }, originEpochSeconds } : null,
  };
}
