import { useId, useState, type KeyboardEvent } from "react";
import { Message } from "./field.tsx";
import styles from "./form.module.css";
import { stationLabel, stationsLike, type StationChoice } from "./station-choice.ts";

/** A stored station by its name, its id or another of its names: typed in part, chosen by keyboard or hand. */
export function StationBox(props: { stations: readonly StationChoice[]; chosen: StationChoice | null; message: string | null; onChoose: (id: string) => void }) {
  const { stations, chosen, message, onChoose } = props;
  const id = useId();
  const [text, setText] = useState<string | null>(null);
  const [isOpen, setIsOpen] = useState(false);
  const [active, setActive] = useState(0);
  const { found, more } = stationsLike(stations, text ?? "");
  const choose = (station: StationChoice): void => {
    setText(null);
    setIsOpen(false);
    onChoose(station.id);
  };
  const leave = (): void => {
    setIsOpen(false);
    const exact = stations.filter((one) => [one.id, one.name].some((name) => name.toUpperCase() === text?.trim().toUpperCase()));
    if (exact.length === 1 && exact[0] !== undefined) choose(exact[0]);
    else if (text?.trim() === "") setText(null);
  };
  const press = (event: KeyboardEvent): void => {
    if (event.key === "ArrowDown" || event.key === "ArrowUp") {
      event.preventDefault();
      setIsOpen(true);
      if (isOpen) setActive((active + (event.key === "ArrowDown" ? 1 : -1) + found.length) % Math.max(1, found.length));
    } else if (event.key === "Enter" && isOpen) {
      event.preventDefault();
      const station = found[active];
      if (station !== undefined) choose(station);
    } else if (event.key === "Escape" && isOpen) {
      event.preventDefault();
      setIsOpen(false);
      setText(null);
    }
  };
  const typed = text?.trim() ?? "";
  const unknown = !isOpen && typed !== "" ? `No station is called “${typed}”. Choose one from the list, or place a new one.` : null;
  const said = unknown ?? message;
  return (
    <div className={styles.field}>
      <label htmlFor={id} className={styles.label}>Station</label>
      <input
        id={id}
        className={styles.input}
        role="combobox"
        autoComplete="off"
        spellCheck={false}
        maxLength={200}
        aria-expanded={isOpen}
        aria-controls={`${id}-list`}
        aria-autocomplete="list"
        aria-activedescendant={isOpen && found.length > 0 ? `${id}-${active}` : undefined}
        aria-invalid={said !== null}
        aria-describedby={said === null ? undefined : `${id}-message`}
        placeholder="Name, id or number"
        value={text ?? (chosen === null ? "" : stationLabel(chosen))}
        onChange={({ target }) => {
          setText(target.value);
          setActive(0);
          setIsOpen(true);
        }}
        onFocus={({ target }) => { target.select(); }}
        onClick={() => { setIsOpen(true); }}
        onBlur={leave}
        onKeyDown={press}
      />
      <ul id={`${id}-list`} role="listbox" aria-label="Stations" className={styles.list} hidden={!isOpen || found.length === 0}>
        {isOpen && found.map((station, i) => (
          <li
            key={station.id}
            id={`${id}-${i}`}
            ref={i === active ? intoView : null}
            role="option"
            aria-selected={i === active}
            className={styles.option}
            onPointerDown={(event) => { event.preventDefault(); }}
            onClick={() => { choose(station); }}
          >
            {stationLabel(station)} <span className={styles.optionMore}>{station.aliases.join(", ")}</span>
          </li>
        ))}
      </ul>
      {isOpen && more > 0 && <p className={styles.hint}>{more} more: type more of the name.</p>}
      {isOpen && found.length === 0 && <p className={styles.hint}>None is called so.</p>}
      <Message id={`${id}-message`} message={said} />
    </div>
  );
}

function intoView(option: HTMLLIElement | null): void {
  option?.scrollIntoView({ block: "nearest" });
}
