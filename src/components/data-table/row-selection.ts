/** Which rows are selected, for a table whose rows can be. */
export type RowSelection<Row> = {
  /** What a row is called when it is read out: "Select AAA-0001". */
  label: (row: Row) => string;
  isSelected: (row: Row) => boolean;
  toggle: (row: Row) => void;
  /** Adds rows, none twice. */
  add: (rows: readonly Row[]) => void;
  /** Selects every row of the question, loaded or not. */
  selectAll: () => void;
};
