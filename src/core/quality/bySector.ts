/**
 * Rows by their sector, in order of first appearance.
 *
 * @example bySector([{ sector: 'C25' }, { sector: 'C16' }, { sector: 'C25' }]).get('C25')?.length // => 2
 */
export function bySector<Row extends { readonly sector: string }>(rows: readonly Row[]): Map<string, Row[]> {
  const groups = new Map<string, Row[]>();
  for (const row of rows) {
    const group = groups.get(row.sector);
    if (group) group.push(row);
    else groups.set(row.sector, [row]);
  }
  return groups;
}
