import { VISIBILITIES } from "#lib/core/arrival/station-description.ts";
import { VISIBILITY_WORDS } from "#lib/presentation/station-words.ts";
import { ChoiceField, NoteField, TextField } from "./issues.tsx";
import type { StationDraft } from "./station-draft.ts";
import styles from "./station-form.module.css";

const SEEN_BY = VISIBILITIES.map((value) => ({ value, words: VISIBILITY_WORDS[value] }));

type Key = "group" | "licence" | "attribution" | "contact" | "doi" | "visibility" | "embargoUntil" | "note";

/** Whose data these are, who sees them, and what has to be said of them wherever they go. */
export function DataFields({ draft, onChange }: { draft: StationDraft; onChange: (part: Partial<StationDraft>) => void }) {
  const of = (path: Key) => ({ path, value: draft[path], onChange: (text: string) => { onChange({ [path]: text }); } });
  return (
    <section className={styles.section} aria-label="Its data">
      <h2 className={styles.heading}>Its data</h2>
      <p className={styles.hint}>Licence, attribution, contact and DOI follow the data into every export and report.</p>
      <div className={styles.grid}>
        <TextField {...of("group")} label="Group" hint="empty: local" />
        <ChoiceField {...of("visibility")} label="Readings are seen by" choices={SEEN_BY} />
        <TextField {...of("embargoUntil")} label="Embargo until" hint="until then by its own group; as 2030-01-01T00:00Z" />
        <TextField {...of("licence")} label="Licence" hint="as CC-BY-4.0" />
        <TextField {...of("attribution")} label="Attribution" className={styles.wide} />
        <TextField {...of("contact")} label="Contact" />
        <TextField {...of("doi")} label="DOI" hint="as 10.1234/buoys.2024" />
        <NoteField {...of("note")} label="Note" className={styles.whole} />
      </div>
    </section>
  );
}
