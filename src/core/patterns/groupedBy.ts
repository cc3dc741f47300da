/**
 * Items by a key, groups and members in the order in which they come.
 *
 * @example [...groupedBy([1, 2, 3], (each) => each % 2).values()] // => [[1, 3], [2]]
 */
export function groupedBy<Item, Key>(items: Iterable<Item>, keyOf: (item: Item) => Key): Map<Key, Item[]> {
  const groups = new Map<Key, Item[]>();
  for (const item of items) {
    const key = keyOf(item);
    const group = groups.get(key);
    if (group) group.push(item);
    else groups.set(key, [item]);
  }
  return groups;
}
