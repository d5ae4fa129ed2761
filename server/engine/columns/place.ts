/** A row of the file (the first after the header is 1) and the line on which it begins. */
export interface RowPlace {
  readonly row: number;
  readonly line: number;
}

/** "row 17", with the line where quoted line breaks or blank lines have shifted it: "row 17 (line 23 of the file)". */
export function printPlace({ row, line }: RowPlace): string {
  return line === row + 1 ? `row ${row}` : `row ${row} (line ${line} of the file)`;
}
