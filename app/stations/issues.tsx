import { createContext, useContext, useId, type InputHTMLAttributes, type ReactNode } from "react";
import type { Issue } from "../_components/ask-server.ts";
import styles from "./station-form.module.css";

/** What the server found wrong with the form, for the fields to show beside themselves. */
const Issues = createContext<readonly Issue[]>([]);

export function IssuesOf({ issues, children }: { issues: readonly Issue[]; children: ReactNode }) {
  return <Issues value={issues}>{children}</Issues>;
}

/** Whether an issue is about a field, or about a part of it. */
export function isAbout(path: string, issue: Issue): boolean {
  return issue.path === path || issue.path.startsWith(`${path}[`) || issue.path.startsWith(`${path}.`);
}

interface FieldProps {
  /** The field's address in a request, such as `deployments[0].from`. */
  readonly path: string;
  readonly label: string;
  readonly hint?: string;
  readonly className?: string | undefined;
}

function useField({ path, hint }: FieldProps) {
  const id = useId();
  const messages = useContext(Issues).filter((issue) => isAbout(path, issue)).map((issue) => messageFor(path, issue));
  const said = [...(hint === undefined ? [] : [`${id}-hint`]), ...(messages.length === 0 ? [] : [`${id}-message`])];
  const attributes = { id, "aria-describedby": said.length === 0 ? undefined : said.join(" "), "aria-invalid": messages.length > 0 };
  return { id, messages, attributes };
}

/** The field stands beside it, so that its address need not be said. */
function messageFor(path: string, { path: place, message }: Issue): string {
  const rest = place.slice(path.length).replace(/^\./, "");
  const words = message.startsWith(`${place}: `) ? message.slice(place.length + 2) : message;
  const leg = /^\[(\d+)\]\.(\w+)$/.exec(rest);
  const where = leg === null ? "" : `leg ${Number(leg[1]) + 1}, ${leg[2] === "lengthKm" ? "length" : "depth"}: `;
  const said = where + words;
  return said.charAt(0).toUpperCase() + said.slice(1);
}

function Framed({ field, label, hint, className, children }: FieldProps & { field: ReturnType<typeof useField>; children: ReactNode }) {
  const { id, messages } = field;
  return (
    <div className={`${styles.field ?? ""} ${className ?? ""}`}>
      <label htmlFor={id}>{label}</label>
      {children}
      {hint !== undefined && <p id={`${id}-hint`} className={styles.hint}>{hint}</p>}
      {messages.length > 0 && <div id={`${id}-message`} className={styles.message}>{messages.map((message) => <p key={message}>{message}</p>)}</div>}
    </div>
  );
}

export function TextField(props: FieldProps & { value: string; onChange: (text: string) => void; input?: InputHTMLAttributes<HTMLInputElement> }) {
  const field = useField(props);
  return (
    <Framed {...props} field={field}>
      <input autoComplete="off" spellCheck={false} {...props.input} {...field.attributes} value={props.value} onChange={({ target }) => { props.onChange(target.value); }} />
    </Framed>
  );
}

export function NoteField(props: FieldProps & { value: string; onChange: (text: string) => void }) {
  const field = useField(props);
  return (
    <Framed {...props} field={field}>
      <textarea rows={3} {...field.attributes} value={props.value} onChange={({ target }) => { props.onChange(target.value); }} />
    </Framed>
  );
}

export function ChoiceField(props: FieldProps & { value: string; choices: readonly { readonly value: string; readonly words: string }[]; onChange: (value: string) => void }) {
  const field = useField(props);
  return (
    <Framed {...props} field={field}>
      <select {...field.attributes} value={props.value} onChange={({ target }) => { props.onChange(target.value); }}>
        {props.choices.map(({ value, words }) => <option key={value} value={value}>{words}</option>)}
      </select>
    </Framed>
  );
}

/** What is wrong with a list as a whole. */
export function ListMessage({ path }: { path: string }) {
  const own = useContext(Issues).filter((issue) => issue.path === path);
  return own.length === 0 ? null : <div className={styles.message} role="note">{own.map(({ message }) => <p key={message}>{message}</p>)}</div>;
}
