import type { Land } from "./land.ts";

/** What a use case is lent by whoever runs it: a command, a page, a test. */
export interface Host {
  /** Name and version of the program. */
  readonly program: string;
  readonly land: Land;
}
