import { useId, type InputHTMLAttributes, type ReactNode } from "react";
import styles from "./form.module.css";

/** A labelled field with what is wrong with it beside it. */
export function Field(props: {
  label: string;
  value: string;
  message: string | null;
  hint?: string | undefined;
  onChange: (text: string) => void;
  onLeave?: () => void;
  input?: InputHTMLAttributes<HTMLInputElement> & { "data-row-field"?: string };
  className?: string | undefined;
  children?: ReactNode;
}) {
  const { label, value, message, hint, onChange, onLeave, input = {}, className, children } = props;
  const id = useId();
  const said = [...(message === null ? [] : [`${id}-message`]), ...(hint === undefined ? [] : [`${id}-hint`])];
  return (
    <div className={`${styles.field ?? ""} ${className ?? ""}`}>
      <label htmlFor={id} className={styles.label}>{label}</label>
      <input
        autoComplete="off"
        spellCheck={false}
        {...input}
        id={id}
        className={styles.input}
        value={value}
        aria-invalid={message !== null}
        aria-describedby={said.length === 0 ? undefined : said.join(" ")}
        onChange={({ target }) => { onChange(target.value); }}
        onBlur={onLeave}
      />
      {children}
      {hint !== undefined && <p id={`${id}-hint`} className={styles.hint}>{hint}</p>}
      <Message id={`${id}-message`} message={message} />
    </div>
  );
}

export function Message({ id, message }: { id: string; message: string | null }) {
  return message === null ? null : <p id={id} className={styles.message}>{message}</p>;
}
