/** One step of the schema: statements that can each run twice, and those that undo them. */
export interface Migration {
  readonly name: string;
  readonly up: readonly string[];
  readonly down: readonly string[];
}
