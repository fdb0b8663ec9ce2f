import type { OriginKind, Quantity } from '#shared/quantity/quantity.ts'

/** Where a person's own figure may come from, in their words. */
export const ownOrigins = [
  { value: 'maker', words: 'from the label or datasheet' },
  { value: 'measured', words: 'measured' },
  { value: 'guess', words: 'my guess' },
] as const satisfies readonly { value: OriginKind; words: string }[]

export type OwnOrigin = (typeof ownOrigins)[number]['value']

export interface Author {
  name: string
  /** ISO date. */
  today: string
}

/** A person's own figure in place of a default. A stated range is kept only where the figure lies in it. */
export function ownFigure(before: Quantity, value: number | null, origin: OwnOrigin, author: Author): Quantity {
  const figure: Quantity = { value, origin, by: author.name, on: author.today }
  if (value !== null) return figure
  if (before.low !== undefined) figure.low = before.low
  if (before.high !== undefined) figure.high = before.high
  return figure
}
