/** One column of a table in fixed-width text. */
export interface Column {
  /** name, and the unit below it */
  head: [name: string, unit: string];
  align: "left" | "right";
  cell: (row: number) => string;
  /** below the last row, such as a sum */
  foot?: string;
}

/**
 * Lays columns out, each as wide as its widest cell, two spaces apart: two lines of heads, a line for every row, one
 * for the feet. Right-aligned numbers of equal decimals stand with their points below one another.
 */
export function columnText(columns: readonly Column[], rows: number): string[] {
  const lines = Array.from({ length: rows + 3 }, () => "");
  for (const [index, { head, align, cell, foot = "" }] of columns.entries()) {
    const cells = [...head, ...Array.from({ length: rows }, (_, row) => cell(row)), foot];
    const width = Math.max(
      ...head.map(({ length }) => length),
      cells.reduce((most, { length }) => Math.max(most, length), 0),
    );
    for (const [row, text] of cells.entries())
      lines[row] += `${index === 0 ? "" : "  "}${align === "left" ? text.padEnd(width) : text.padStart(width)}`;
  }
  return lines.map((line) => line.trimEnd());
}
