import { ChoiceField, ListMessage, TextField } from "./issues.tsx";
import { blankDeployment, nextRow, type DeploymentDraft } from "./station-draft.ts";
import styles from "./station-form.module.css";

const SENSORS = [{ value: "surface", words: "at the surface" }, { value: "pressure", words: "pressure" }, { value: "ground", words: "ground motion (its frequency is halved)" }];
const STAMPS = [{ value: "", words: "not known" }, { value: "start", words: "start" }, { value: "middle", words: "middle" }, { value: "end", words: "end" }];
const TIME_HINT = "UTC, as 2004-02-01T00:00Z; empty: open";
const DECIMAL = { inputMode: "decimal" } as const;

interface ListProps {
  readonly deployments: readonly DeploymentDraft[];
  readonly onChange: (deployments: readonly DeploymentDraft[]) => void;
}

/** Where the station's sensor stood, span after span. */
export function DeploymentFields({ deployments, onChange }: ListProps) {
  const add = (): void => {
    const { name, sensor, recordMinutes, stamp, timeZone, to } = deployments.at(-1) ?? blankDeployment(0);
    onChange([...deployments, blankDeployment(nextRow(deployments), { name, sensor, recordMinutes, stamp, timeZone, from: to })]);
  };
  return (
    <section className={styles.section} aria-label="Deployments">
      <h2 className={styles.heading}>Deployments</h2>
      <p className={styles.hint}>Where the sensor stood, and what it was, over a span of time; no two may overlap.</p>
      <ListMessage path="deployments" />
      {deployments.map((one, place) => (
        <Deployment
          key={one.row}
          draft={one}
          place={place}
          onChange={(part) => { onChange(deployments.map((other) => (other.row === one.row ? { ...other, ...part } : other))); }}
          onRemove={deployments.length > 1 ? () => { onChange(deployments.filter(({ row }) => row !== one.row)); } : null}
        />
      ))}
      <button type="button" className={styles.button} onClick={add}>Add a deployment</button>
    </section>
  );
}

function Deployment({ draft, place, onChange, onRemove }: { draft: DeploymentDraft; place: number; onChange: (part: Partial<DeploymentDraft>) => void; onRemove: (() => void) | null }) {
  const of = (key: Exclude<keyof DeploymentDraft, "row">) => ({ path: `deployments[${place}].${key}`, value: draft[key], onChange: (text: string) => { onChange({ [key]: text }); } });
  return (
    <fieldset className={styles.group}>
      <legend>Deployment {place + 1}</legend>
      <div className={styles.grid}>
        <TextField {...of("name")} label="Name" className={styles.wide} />
        <TextField {...of("latitudeDegrees")} label="Latitude, ° north" hint="south negative" input={DECIMAL} />
        <TextField {...of("longitudeDegrees")} label="Longitude, ° east" hint="-180 to 360; west negative" input={DECIMAL} />
        <TextField {...of("from")} label="From" hint={TIME_HINT} />
        <TextField {...of("to")} label="To" hint={TIME_HINT} />
        <ChoiceField {...of("sensor")} label="Sensor" choices={SENSORS} />
        <TextField {...of("depthMetres")} label="Water depth, m" input={DECIMAL} />
        <TextField {...of("recordMinutes")} label="Record length, minutes" input={DECIMAL} />
        <ChoiceField {...of("stamp")} label="Time stamp marks the record’s" choices={STAMPS} />
        <TextField {...of("facesFromDegrees")} label="Faces from, °" hint="a bearing that waves come from" input={DECIMAL} />
        <TextField {...of("facesToDegrees")} label="Faces to, °" hint="clockwise; both empty: all round" input={DECIMAL} />
        <TextField {...of("timeZone")} label="Time zone" hint="IANA name, as Pacific/Honolulu" input={{ list: "time-zones" }} />
        <TextField {...of("shelf")} label="Way over the shelf" hint="legs seaward as km:depth in m, as 12:40 35:90" className={styles.wide} />
      </div>
      {onRemove !== null && <button type="button" className={styles.button} onClick={onRemove}>Remove deployment {place + 1}</button>}
    </fieldset>
  );
}
