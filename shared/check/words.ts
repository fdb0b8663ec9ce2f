import { compareRefs, splitRef } from '../build/refOrder.ts'
import type { ResolvedConnector, ResolvedPart } from '../build/resolve.ts'

/** Units that findings speak in, each with its number of decimals and its name. */
const units = {
  A: { decimals: 1, name: 'A' },
  W: { decimals: 0, name: 'W' },
  V: { decimals: 2, name: 'V' },
  TB: { decimals: 2, name: 'TB' },
  h: { decimals: 1, name: 'h' },
  'Gb/s': { decimals: 1, name: 'Gb/s' },
  'MB/s': { decimals: 0, name: 'MB/s' },
  '%': { decimals: 0, name: '%' },
} as const
export type WordUnit = keyof typeof units

/** A number with its unit for reading, as "8.0 A", "2.2 TB", "1,200 MB/s". Same everywhere, whatever the locale. */
export function amount(value: number, unit: WordUnit): string {
  const { decimals, name } = units[unit]
  const text = value.toFixed(decimals)
  const keepsZeros = unit === 'A' || unit === 'V'
  return `${groupThousands(keepsZeros ? text : trimZeros(text))} ${name}`
}

/** A length, as "450 mm" or "1.2 m". */
export function length(value_mm: number): string {
  return value_mm < 1000 ? `${Math.round(value_mm)} mm` : `${trimZeros((value_mm / 1000).toFixed(2))} m`
}

/** A number with a noun, as "1 drive", "4 drives". */
export const counted = (count: number, noun: string, plural = `${noun}s`): string =>
  `${count} ${count === 1 ? noun : plural}`

/** Items in a sentence: "a", "a and b", "a, b and c"; past `most`, "a, b, c and 5 more". */
export function listed(items: readonly string[], most = 6): string {
  const shown = items.length > most ? [...items.slice(0, most), `${items.length - most} more`] : items
  if (shown.length <= 1) return shown[0] ?? ''
  return `${shown.slice(0, -1).join(', ')} and ${shown.at(-1)}`
}

/** Designations in natural order with runs drawn together: "C1 to C4 and C9". */
export function refsOf(parts: readonly ResolvedPart[]): string {
  const refs = [...new Set(parts.map((part) => part.part.ref))].sort(compareRefs)
  const runs: { first: string; last: string; count: number }[] = []
  for (const ref of refs) {
    const run = runs.at(-1)
    const { letters, number } = splitRef(ref)
    const before = run && splitRef(run.last)
    if (run && before && before.letters === letters && before.number === number - 1) {
      run.last = ref
      run.count++
    } else runs.push({ first: ref, last: ref, count: 1 })
  }
  return listed(
    runs.flatMap(({ first, last, count }) =>
      count === 1 ? [first] : count === 2 ? [first, last] : [`${first} to ${last}`],
    ),
  )
}

/** A part as a sentence names it: "C3", or "C3 (left tank)" where it has a name of its own. */
export const nameOf = ({ part }: ResolvedPart): string => (part.name ? `${part.ref} (${part.name})` : part.ref)

/** A connector as a sentence names it: "W2 leg 3". */
export const placeOf = ({ part, connector }: ResolvedConnector): string => `${part.part.ref} ${connector.label}`

function trimZeros(text: string): string {
  return text.includes('.') ? text.replace(/\.?0+$/, '') : text
}

function groupThousands(text: string): string {
  const [whole = '', fraction] = text.split('.')
  const grouped = whole.replace(/\B(?=(\d{3})+(?!\d))/g, ',')
  return fraction === undefined ? grouped : `${grouped}.${fraction}`
}
