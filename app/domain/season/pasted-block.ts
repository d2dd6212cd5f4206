/**
 * The cells of a block copied from a spreadsheet: columns parted by tabs, rows by line ends. A cell in quotation marks
 * may hold line ends and tabs; two quotation marks in it stand for one.
 *
 * @param text - as the clipboard gives it
 * @returns rows of cells, the empty last line left out; [] for an empty text
 * @example pastedBlock("a\tb\n1\t2\n") // [["a", "b"], ["1", "2"]]
 */
export function pastedBlock(text: string): string[][] {
  const rows: string[][] = [];
  let row: string[] = [];
  let cell = "";
  let isQuoted = false;
  const endCell = () => {
    row.push(cell.trim());
    cell = "";
  };
  const endRow = () => {
    endCell();
    rows.push(row);
    row = [];
  };
  for (let at = 0; at < text.length; at += 1) {
    const sign = text.charAt(at);
    if (isQuoted) {
      if (sign !== '"') cell += sign;
      else if (text.charAt(at + 1) === '"') {
        cell += sign;
        at += 1;
      } else isQuoted = false;
    } else if (sign === '"' && cell === "") isQuoted = true;
    else if (sign === "\t") endCell();
    else if (sign === "\n" || sign === "\r") {
      if (sign === "\r" && text.charAt(at + 1) === "\n") at += 1;
      endRow();
    } else cell += sign;
  }
  if (cell !== "" || row.length > 0) endRow();
  return rows;
}
