import * as z from "zod/mini";
import { QUALITY_FLAGS } from "#lib/core/arrival/quality.ts";

const text = z.string().check(z.maxLength(10_000));

const rowShape = z.object({
  key: z.int(),
  ...{ date: text, time: text, period: text, waves: text, seconds: text },
  turn: z.nullable(z.enum(["earlier", "later"])),
  quality: z.literal(QUALITY_FLAGS),
});

/** What somebody has typed and not brought in yet. */
const draftShape = z.object({
  station: z.object({
    way: z.enum(["stored", "new"]),
    /** Of a stored one; empty while none is chosen. */
    id: text,
    placed: z.object({ id: text, name: text, latitude: text, longitude: text, timeZone: text }),
  }),
  clock: z.enum(["utc", "station"]),
  rows: z.array(rowShape).check(z.minLength(1), z.maxLength(5000)),
  note: text,
  keep: z.object({ way: z.enum(["new", "event", "waiting"]), title: text, event: text }),
});

export type Draft = z.infer<typeof draftShape>;
export type DraftRow = Draft["rows"][number];

export const EMPTY_ROW = { date: "", time: "", turn: null, period: "", waves: "", seconds: "", quality: 2 } as const satisfies Omit<DraftRow, "key">;

export const EMPTY_DRAFT: Draft = {
  station: { way: "stored", id: "", placed: { id: "", name: "", latitude: "", longitude: "", timeZone: "" } },
  clock: "utc",
  rows: [{ key: 1, ...EMPTY_ROW }],
  note: "",
  keep: { way: "new", title: "", event: "" },
};

/** A draft as it was written; null where it is none, or another version's. */
export function readDraft(json: string | null): Draft | null {
  if (json === null) return null;
  try {
    const read = draftShape.safeParse(JSON.parse(json));
    return read.success && new Set(read.data.rows.map(({ key }) => key)).size === read.data.rows.length ? read.data : null;
  } catch {
    return null;
  }
}
