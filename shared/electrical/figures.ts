import type { Figure } from '../check/result.ts'
import type { Quantity } from '../quantity/quantity.ts'

/** A figure as the sums take it, with the range it may lie in. */
export interface Taken {
  value: number
  low: number
  high: number
  /** Rests on an unknown or guessed figure. */
  about: boolean
  figure: Figure
}

/** A figure as it was read, for showing where a verdict comes from. */
export function figureOf(quantity: Quantity, what: string, unit: string): Figure {
  const { value, low, high, origin, source, clause, fromMemory } = quantity
  return {
    what,
    value,
    ...(low === undefined ? {} : { low }),
    ...(high === undefined ? {} : { high }),
    unit,
    origin,
    ...(source === undefined ? {} : { source }),
    ...(clause === undefined ? {} : { clause }),
    ...(fromMemory === undefined ? {} : { fromMemory }),
  }
}

/**
 * A load: where the value is unknown its own high end, else its class's, else a stated worst. Never zero.
 * `inClass` is the same figure of the model's class.
 */
export function takeLoad(
  quantity: Quantity,
  inClass: Quantity | undefined,
  worst: number,
  what: string,
  unit: string,
): Taken {
  const known = quantity.value ?? quantity.high
  if (known !== undefined)
    return {
      value: known,
      low: quantity.low ?? (quantity.value === null ? 0 : known),
      high: quantity.high ?? known,
      about: quantity.value === null || quantity.origin === 'guess',
      figure: figureOf(quantity, what, unit),
    }
  const fallback = inClass?.high ?? inClass?.value ?? worst
  const figure = figureOf(
    inClass ?? quantity,
    inClass ? `${what} (unknown; its class)` : `${what} (unknown; worst)`,
    unit,
  )
  return {
    value: fallback,
    low: quantity.low ?? 0,
    high: fallback,
    about: true,
    figure: { ...figure, value: fallback },
  }
}

/** A limit: where the value is unknown its low end, else none. */
export function takeLimit(quantity: Quantity, what: string, unit: string): Taken | null {
  const known = quantity.value ?? quantity.low
  if (known === undefined) return null
  return {
    value: known,
    low: quantity.low ?? known,
    high: quantity.high ?? known,
    about: quantity.value === null || quantity.origin === 'guess',
    figure: figureOf(quantity, what, unit),
  }
}

/** A length or resistance: pessimistic end where unknown, else a stated worst. */
export function takeSize(quantity: Quantity, worst: number): { value: number; about: boolean } {
  const known = quantity.value ?? quantity.high
  return known === undefined
    ? { value: worst, about: true }
    : { value: known, about: quantity.value === null || quantity.origin === 'guess' }
}

/** Compares a load with a limit, forgiving what rounding does to a sum that meets its limit exactly. */
export const exceeds = (load: number, limit: number): boolean => load > limit * (1 + 1e-9)
