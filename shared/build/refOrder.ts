/** A reference designation in its two halves. */
export interface RefKey {
  letters: string
  number: number
}

export function splitRef(ref: string): RefKey {
  let digits = 0
  while (digits < ref.length && !isDigit(ref.charCodeAt(digits))) digits++
  return { letters: ref.slice(0, digits), number: digits === ref.length ? 0 : Number(ref.slice(digits)) }
}

const isDigit = (code: number): boolean => code >= 48 && code <= 57

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
