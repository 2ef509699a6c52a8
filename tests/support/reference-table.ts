import { readFileSync } from "node:fs";
import { z } from "zod";
import type { Tolerance } from "./expect-within.ts";

const toleranceSchema = z.union([
  z.strictObject({ absolute: z.number().positive() }),
  z.strictObject({ relative: z.number().positive() }),
]);

/** Rows of truth from outside, as `fixtures/reference/<name>.json` holds them, with the tolerance they allow. */
export interface ReferenceTable<Row> {
  readonly source: string;
  readonly tolerance: Tolerance;
  readonly rows: readonly Row[];
}

export function referenceTable<Row extends z.ZodType>(name: string, row: Row): ReferenceTable<z.output<Row>> {
  const file = new URL(`../../fixtures/reference/${name}.json`, import.meta.url);
  const schema = z.looseObject({
    source: z.string(),
    tolerance: toleranceSchema,
    unit: z.string(),
    because: z.string(),
    rows: z.array(row),
  });
  const { source, tolerance, unit, because, rows } = schema.parse(JSON.parse(readFileSync(file, "utf8")));
  return { source, tolerance: { ...tolerance, unit, because }, rows };
}

/** What a reference file holds beside its rows, such as the inputs that all of them share. */
export function referenceFacts<Facts extends z.ZodType>(name: string, facts: Facts): z.output<Facts> {
  const file = new URL(`../../fixtures/reference/${name}.json`, import.meta.url);
  return facts.parse(JSON.parse(readFileSync(file, "utf8")));
}

export const positionSchema = z.strictObject({ latitudeDegrees: z.number(), longitudeDegrees: z.number() });
