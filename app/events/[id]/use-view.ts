import { useSearchParams } from "next/navigation";
import { useCallback, useEffect, useState } from "react";
import { queryFromView, viewFromQuery, type EventView, type ViewDefaults } from "./view.ts";

export type ChangeView = (part: Partial<EventView>) => void;

/**
 * The reader's view and a way to change it. The address is what holds it: a page that comes back by the browser's own
 * buttons may have been made for an earlier address, so the view is read from the one that stands there now.
 */
export function useView(defaults: ViewDefaults): [EventView, ChangeView] {
  const query = useSearchParams();
  const [view, setView] = useState(() => viewFromQuery(new URLSearchParams(query), defaults));

  useEffect(() => {
    const { pathname } = globalThis.location;
    const follow = (): void => {
      const { location } = globalThis;
      if (location.pathname === pathname) setView(viewFromQuery(new URLSearchParams(location.search), defaults));
    };
    globalThis.addEventListener("popstate", follow);
    return () => { globalThis.removeEventListener("popstate", follow); };
  }, [defaults]);

  useEffect(() => {
    const { pathname, search, hash } = globalThis.location;
    const wanted = queryFromView(view, defaults);
    if (wanted !== search) globalThis.history.replaceState(null, "", pathname + wanted + hash);
  }, [view, defaults]);

  const change = useCallback((part: Partial<EventView>) => { setView((before) => ({ ...before, ...part })); }, []);
  return [view, change];
}
