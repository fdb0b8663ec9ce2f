import type { ModelKind } from '../catalog/model.ts'

/** Class letters of IEC 81346-2 as the trade sheet uses them; which letter a part kind takes is our reading. */
export const refLetter: Readonly<Record<ModelKind, string>> = {
  supply: 'T',
  lead: 'W',
  splitter: 'W',
  adapter: 'W',
  breakout: 'W',
  cable: 'W',
  controller: 'K',
  expander: 'K',
  board: 'K',
  backplane: 'U',
  case: 'A',
  drive: 'C',
  fan: 'G',
  load: 'E',
}

/** The next free reference designation of a kind: one past the highest ever seen, so numbers are never given twice. */
export function nextRef(kind: ModelKind, taken: Iterable<string>): string {
  const letter = refLetter[kind]
  let highest = 0
  for (const ref of taken)
    if (ref.startsWith(letter)) {
      const number = Number(ref.slice(letter.length))
      if (Number.isInteger(number) && number > highest) highest = number
    }
  return `${letter}${highest + 1}`
}
