/** Something that a reader of files did, or noticed, that the person who handed the file in should know. */
export interface Note {
  readonly code: string;
  readonly message: string;
}

/** What a file held, and what there is to say about how it was read. */
export interface ReadResult<Value> {
  readonly value: Value;
  readonly notes: readonly Note[];
}
