"use client";

import forms from "./_components/forms.module.css";
import text from "./page-text.module.css";

/** A bug of ours: the reader gets a reference to quote, and nothing of the inside. */
export default function ErrorPage({ error, retry }: { error: unknown; retry: () => void }) {
  const reference = error instanceof Error && "digest" in error ? String(error.digest) : null;
  return (
    <div className={text.page} role="alert">
      <h1 className={text.title}>This page could not be made</h1>
      <p className={text.lead}>
        The fault is in the program{reference === null ? "." : `; the server’s log has it under ${reference}.`} Nothing
        that was stored is lost.
      </p>
      <p className={text.action}>
        <button type="button" className={forms.button} onClick={retry}>
          Try again
        </button>
      </p>
    </div>
  );
}
