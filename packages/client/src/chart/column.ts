/** A named column of a table of numbers, as it is shown and saved. */
export interface Column {
  readonly name: string;
  readonly values: readonly (number | string | null)[];
}
