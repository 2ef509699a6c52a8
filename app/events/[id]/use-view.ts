import { useSearchParams } from "next/navigation";
import { useCallback, useEffect, useState } from "react";
import { queryFromView, viewFromQuery, type EventView } from "./view.ts";

export type ChangeView = (part: Partial<EventView>) => void;

/**
 * The reader's view and a way to change it. The address is what holds it: a page that comes back by the browser's own
 * buttons may have been made for an earlier address, so the view is read from the one that stands there now.
 */
export function useView(knownIds: readonly string[]): [EventView, ChangeView] {
  const query = useSearchParams();
  const [view, setView] = useState(() => viewFromQuery(new URLSearchParams(query), knownIds));

  useEffect(() => {
    const { pathname } = globalThis.location;
    const follow = (): void => {
      const { location } = globalThis;
      if (location.pathname === pathname) setView(viewFromQuery(new URLSearchParams(location.search), knownIds));
    };
    globalThis.addEventListener("popstate", follow);
    return () => { globalThis.removeEventListener("popstate", follow); };
  }, [knownIds]);

  useEffect(() => {
    const { pathname, search, hash } = globalThis.location;
    const wanted = queryFromView(view);
    if (wanted !== search) globalThis.history.replaceState(null, "", pathname + wanted + hash);
  }, [view]);

  const change = useCallback((part: Partial<EventView>) => { setView((before) => ({ ...before, ...part })); }, []);
  return [view, change];
}
