/** A reference designation in its two halves. */
export interface RefKey {
  letters: string
  number: number
}

export function splitRef(ref: string): RefKey {
  const digits = ref.search(/[0-9]/)
  return digits < 0 ? { letters: ref, number: 0 } : { letters: ref.slice(0, digits), number: Number(ref.slice(digits)) }
}

function compareKeys(a: RefKey, b: RefKey): number {
  if (a.letters !== b.letters) return a.letters < b.letters ? -1 : 1
  return a.number - b.number
}

/** Natural order of reference designations: W2 before W10. */
export const compareRefs = (a: string, b: string): number => compareKeys(splitRef(a), splitRef(b))

/** Place of each reference in the natural order, by its index in the list given. */
export function rankRefs(refs: readonly string[]): Int32Array {
  const keys = refs.map(splitRef)
  const order = Array.from(keys.keys()).sort((a, b) => compareKeys(keys[a]!, keys[b]!))
  const ranks = new Int32Array(refs.length)
  order.forEach((index, place) => (ranks[index] = place))
  return ranks
}
