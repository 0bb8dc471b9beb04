/**
 * Things by a key, each group and the groups themselves in the order of first appearance.
 *
 * @param things - any things
 * @param keyOf - the key of one
 * @returns the groups by key
 */
export function grouped<Thing, Key>(
  things: Iterable<Thing>,
  keyOf: (thing: Thing) => Key,
): ReadonlyMap<Key, readonly Thing[]> {
  const groups = new Map<Key, Thing[]>();
  for (const thing of things) {
    const key = keyOf(thing);
    const group = groups.get(key);
    if (group === undefined) groups.set(key, [thing]);
    else group.push(thing);
  }
  return groups;
}
