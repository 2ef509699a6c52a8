import { setTimeout as pause } from "node:timers/promises";
import { expect, test } from "vitest";
import { createWriteGate } from "#lib/store/write-gate.ts";

test("the write gate lets one piece of work through at a time, in order, and outlives a failure", async () => {
  const gate = createWriteGate();
  const seen: string[] = [];
  const work = (name: string, milliseconds: number, fails = false) =>
    gate.through(async () => {
      seen.push(`${name} begins`);
      await pause(milliseconds);
      seen.push(`${name} ends`);
      if (fails) throw new Error(name);
      return name;
    });

  const results = await Promise.allSettled([work("slow", 30), work("failing", 10, true), work("quick", 0)]);
  await gate.settled();
  expect(seen).toStrictEqual(["slow begins", "slow ends", "failing begins", "failing ends", "quick begins", "quick ends"]);
  expect(results.map((result) => result.status)).toStrictEqual(["fulfilled", "rejected", "fulfilled"]);
  expect(await gate.through(() => Promise.resolve("later"))).toBe("later");
});
