import { ListMessage, TextField } from "./issues.tsx";
import { nextRow, type AliasDraft } from "./station-draft.ts";
import styles from "./station-form.module.css";

/** Other names that the station goes by. */
export function AliasFields({ aliases, onChange }: { aliases: readonly AliasDraft[]; onChange: (aliases: readonly AliasDraft[]) => void }) {
  return (
    <section className={styles.section} aria-label="Aliases">
      <h2 className={styles.heading}>Aliases</h2>
      <p className={styles.hint}>Other names that it goes by, such as its WMO number; each belongs to one station.</p>
      <ListMessage path="aliases" />
      {aliases.map((alias, place) => {
        const of = (key: "scheme" | "value") => ({
          path: `aliases[${place}].${key}`,
          value: alias[key],
          onChange: (text: string) => { onChange(aliases.map((other) => (other.row === alias.row ? { ...other, [key]: text } : other))); },
        });
        return (
          <fieldset key={alias.row} className={styles.line}>
            <legend className="for-screen-readers">Alias {place + 1}</legend>
            <TextField {...of("scheme")} label="Kind" hint="as wmo" className={styles.narrow} />
            <TextField {...of("value")} label="Name or number" />
            <button type="button" className={styles.button} aria-label={`Remove alias ${place + 1}`} onClick={() => { onChange(aliases.filter(({ row }) => row !== alias.row)); }}>Remove</button>
          </fieldset>
        );
      })}
      <button type="button" className={styles.button} onClick={() => { onChange([...aliases, { row: nextRow(aliases), scheme: aliases.length === 0 ? "wmo" : "", value: "" }]); }}>Add an alias</button>
    </section>
  );
}
