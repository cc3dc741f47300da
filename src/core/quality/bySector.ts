/** Rows by their sector, in order of first appearance. */
export function bySector<Row extends { readonly sector: string }>(rows: readonly Row[]): Map<string, Row[]> {
  const groups = new Map<string, Row[]>();
  for (const row of rows) {
    const group = groups.get(row.sector);
    if (group) group.push(row);
    else groups.set(row.sector, [row]);
  }
  return groups;
}
