/** Whether two pieces of a document say the same; the order of fields does not count, a missing field is an absent one. */
export function same(a: unknown, b: unknown): boolean {
  if (Object.is(a, b)) return true
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false
  if (Array.isArray(a) || Array.isArray(b))
    return Array.isArray(a) && Array.isArray(b) && a.length === b.length && a.every((item, i) => same(item, b[i]))
  const [left, right] = [a as Record<string, unknown>, b as Record<string, unknown>]
  const names = new Set([...Object.keys(left), ...Object.keys(right)])
  return [...names].every((name) => same(left[name], right[name]))
}
