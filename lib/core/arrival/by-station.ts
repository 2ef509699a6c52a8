/** Items grouped by the station that they belong to, each group and the stations in the order in which they came. */
export function byStation<Item>(items: readonly Item[], idOf: (item: Item) => string): Map<string, Item[]> {
  const groups = new Map<string, Item[]>();
  for (const item of items) {
    const id = idOf(item);
    const group = groups.get(id);
    if (group === undefined) groups.set(id, [item]);
    else group.push(item);
  }
  return groups;
}
