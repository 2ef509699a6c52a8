import { useEffect, useRef } from "react";
import { openShelf, type DraftShelf } from "./draft-shelf.ts";

interface ShelfUse {
  /** What the work is about; the same for as long as the page stands. */
  readonly subject: string;
  /** The work as it is now; null where there is nothing that anybody would miss. */
  readonly text: string | null;
  /** Told once, when the page opens, of work that was left there. */
  readonly onFound: (text: string) => void;
  /** Whether the browser took what was put aside. */
  readonly onRemembered: (isTaken: boolean) => void;
}

/** Puts work aside with every change, and brings back what another tab left behind when it was closed. */
export function useDraftShelf(use: ShelfUse): void {
  const latest = useRef(use);
  const shelf = useRef<DraftShelf | null>(null);
  useEffect(() => { latest.current = use; });

  const { subject, text } = use;
  useEffect(() => {
    const opening = { isCurrent: true };
    void openShelf(subject).then((opened) => {
      if (!opening.isCurrent) {
        opened.close();
        return;
      }
      shelf.current = opened;
      const { text: now, onFound, onRemembered } = latest.current;
      if (opened.found !== null && now === null) onFound(opened.found);
      else onRemembered(opened.put(now));
    });
    return () => {
      opening.isCurrent = false;
      shelf.current?.close();
      shelf.current = null;
    };
  }, [subject]);
  useEffect(() => {
    if (shelf.current !== null) latest.current.onRemembered(shelf.current.put(text));
  }, [text]);
}
