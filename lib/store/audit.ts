import type { AuditLine, Doing } from "#lib/application/ports.ts";
import type { Prisma, PrismaClient } from "./generated/client.ts";

/** Adds a line to the audit trail, in the transaction of the change that it tells of. */
export async function addToAudit(transaction: Prisma.TransactionClient, doing: Doing, line: Pick<AuditLine, "action" | "subject" | "detail">): Promise<void> {
  const { actor, savedEpochSeconds: atEpochSeconds } = doing;
  const { action, subject, detail } = line;
  await transaction.auditEntry.create({ data: { atEpochSeconds, actor, action, subject, detail: JSON.stringify(detail) } });
}

export async function listAudit(reader: PrismaClient, { subject, limit }: { subject: string; limit: number }): Promise<AuditLine[]> {
  const rows = await reader.auditEntry.findMany({ where: { subject }, orderBy: { id: "desc" }, take: limit });
  return rows.map(({ atEpochSeconds, actor, action, detail }) => ({
    ...{ savedEpochSeconds: atEpochSeconds, actor, action, subject },
    detail: JSON.parse(detail) as unknown,
  }));
}
