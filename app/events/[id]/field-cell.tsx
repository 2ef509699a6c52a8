import { useId, useState } from "react";
import { onceLifted } from "../../_components/once-lifted.ts";
import styles from "./readings-panel.module.css";

/**
 * A field that hands on what is typed once it is left or Enter is pressed, and says beside itself what it cannot use.
 * Up and down change the value by a step at once; Escape takes back what was typed.
 */
export function FieldCell(props: {
  label: string;
  text: string;
  value: number;
  parse: (text: string) => number | null;
  wanted: string;
  step: number;
  width: "time" | "period";
  onValue: (value: number) => void;
}) {
  const { label, text, value, parse, wanted, step, width, onValue } = props;
  const problem = useId();
  const [typed, setTyped] = useState<string | null>(null);
  const [isLeft, setIsLeft] = useState(false);
  const isFaulty = typed !== null && isLeft && parse(typed) === null;

  const commit = (): void => {
    onceLifted(() => { setIsLeft(true); });
    if (typed === null) return;
    const next = typed === text ? value : parse(typed);
    if (next === null) return;
    setTyped(null);
    if (next !== value) onValue(next);
  };
  const press = (event: React.KeyboardEvent): void => {
    const steps = { ArrowUp: 1, ArrowDown: -1 }[event.key];
    if (event.key === "Enter") commit();
    if (event.key === "Escape" && typed !== null) {
      event.preventDefault(); // here it takes back what was typed, and does not drop the focus
      setTyped(null);
    }
    if (steps === undefined || typed !== null) return;
    event.preventDefault();
    const next = value + steps * step;
    if (next > 0) onValue(next);
  };
  return (
    <>
      <input
        className={width === "time" ? styles.time : styles.period}
        inputMode={width === "time" ? "text" : "decimal"}
        autoComplete="off"
        aria-label={label}
        aria-invalid={isFaulty}
        aria-describedby={isFaulty ? problem : undefined}
        value={typed ?? text}
        onChange={({ target }) => { setTyped(target.value); }}
        onFocus={() => { setIsLeft(false); }}
        onBlur={commit}
        onKeyDown={press}
      />
      {isFaulty && <span id={problem} className={styles.problem} role="alert">Wanted {wanted}.</span>}
    </>
  );
}
