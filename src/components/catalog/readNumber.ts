/** A number as people type it: a comma counts as the decimal sign. Null for nothing, undefined for no number. */
export function readNumber(text: string): number | null | undefined {
  const plain = text.trim().replace(',', '.')
  if (plain === '') return null
  if (!/^\d*\.?\d+$|^\d+\.$/.test(plain)) return undefined
  return Number(plain)
}
