/** Adds to the list under a key, making it where there is none. */
export function push<K, V>(map: Map<K, V[]>, key: K, value: V): void {
  const list = map.get(key)
  if (list) list.push(value)
  else map.set(key, [value])
}

/** Sorts values into lists by key, keeping their order. */
export function groupBy<K, V>(values: readonly V[], keyOf: (value: V) => K): Map<K, V[]> {
  const groups = new Map<K, V[]>()
  for (const value of values) push(groups, keyOf(value), value)
  return groups
}
