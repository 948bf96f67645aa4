/**
 * Items in ascending order of a key, equals as they came. Sorts numbers natively and looks the items
 * up, which for tens of thousands is several times quicker than sorting by a comparison.
 */
export function inOrder<Item>(items: readonly Item[], keyOf: (item: Item) => number): Item[] {
  const keys = Float64Array.from(items, keyOf);
  const distinct = Float64Array.from(new Set(keys)).sort();
  const place = new Map<number, number>();
  distinct.forEach((key, k) => place.set(key, k));
  const groups: Item[][] = Array.from(distinct, () => []);
  items.forEach((item, k) => groups[place.get(keys[k]!)!]!.push(item));
  return groups.flat();
}
