import { useState } from "react";
import { onceLifted } from "../_components/once-lifted.ts";

export interface LeftFields {
  /** Whether what is wrong with a field is said by now. */
  readonly isShown: (name: string) => boolean;
  readonly leave: (names: readonly string[]) => void;
  /** Everything is said from now on: somebody wanted to bring the readings in. */
  readonly showAll: () => void;
  readonly forget: () => void;
}

/** The fields that somebody has been in and has left: what is wrong is said of those alone. */
export function useLeftFields(): LeftFields {
  const [names, setNames] = useState<ReadonlySet<string>>(new Set());
  const [isAll, setIsAll] = useState(false);
  return {
    isShown: (name) => isAll || names.has(name),
    leave: (more) => {
      onceLifted(() => { setNames((before) => (more.every((name) => before.has(name)) ? before : new Set([...before, ...more]))); });
    },
    showAll: () => { setIsAll(true); },
    forget: () => {
      setNames(new Set());
      setIsAll(false);
    },
  };
}
