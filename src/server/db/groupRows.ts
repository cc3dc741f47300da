/** Rows by a key of theirs, in the order they came. */
export function groupRows<Row, Key, Value>(
  rows: readonly Row[],
  keyOf: (row: Row) => Key,
  toValue: (row: Row) => Value,
): ReadonlyMap<Key, Value[]> {
  const groups = new Map<Key, Value[]>();
  for (const row of rows) {
    const key = keyOf(row);
    const group = groups.get(key);
    if (group) group.push(toValue(row));
    else groups.set(key, [toValue(row)]);
  }
  return groups;
}
