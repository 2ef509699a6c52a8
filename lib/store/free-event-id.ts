import type { Prisma } from "./generated/client.ts";

/**
 * An id for an event of these arrivals: the day (UTC) on which the first of them came in, or else the day of saving;
 * `2024-02-28`, then `2024-02-28-2` and so on. It is free for as long as the transaction that asked holds the write gate.
 */
export async function freeEventId(transaction: Prisma.TransactionClient, arrivalIds: readonly number[], savedEpochSeconds: number): Promise<string> {
  const { _min: first } = await transaction.reading.aggregate({ where: { arrivalId: { in: [...arrivalIds] } }, _min: { arrivalEpochSeconds: true } });
  const day = new Date((first.arrivalEpochSeconds ?? savedEpochSeconds) * 1000).toISOString().slice(0, 10);
  const taken = new Set((await transaction.event.findMany({ where: { id: { startsWith: day } }, select: { id: true } })).map(({ id }) => id));
  for (let count = 1; ; count += 1) {
    const id = count === 1 ? day : `${day}-${count}`;
    if (!taken.has(id)) return id;
  }
}
