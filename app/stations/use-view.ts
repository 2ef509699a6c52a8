import { useSearchParams } from "next/navigation";
import { useCallback, useEffect, useState } from "react";
import { queryFromView, viewFromQuery, type RegisterView } from "./view.ts";

export type ChangeView = (part: Partial<RegisterView>) => void;

/** The reader's view and a way to change it; the address holds it, also when the browser's own buttons bring it back. */
export function useView(): [RegisterView, ChangeView] {
  const query = useSearchParams();
  const [view, setView] = useState(() => viewFromQuery(new URLSearchParams(query)));

  useEffect(() => {
    const { pathname } = globalThis.location;
    const follow = (): void => {
      const { location } = globalThis;
      if (location.pathname === pathname) setView(viewFromQuery(new URLSearchParams(location.search)));
    };
    globalThis.addEventListener("popstate", follow);
    return () => { globalThis.removeEventListener("popstate", follow); };
  }, []);

  useEffect(() => {
    const { pathname, search, hash } = globalThis.location;
    const wanted = queryFromView(view);
    if (wanted !== search) globalThis.history.replaceState(null, "", pathname + wanted + hash);
  }, [view]);

  const change = useCallback((part: Partial<RegisterView>) => { setView((before) => ({ ...before, ...part })); }, []);
  return [view, change];
}
