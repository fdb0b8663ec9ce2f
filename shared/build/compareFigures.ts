import type { Model } from '../catalog/model.ts'
import { quantitySchema, type Quantity } from '../quantity/quantity.ts'
import { same } from './same.ts'

/** One figure of a model before and after; null where it is missing. */
export interface FigureDifference {
  path: string
  from: Quantity | null
  to: Quantity | null
}

/** The figures in which two states of a model differ, by their paths. */
export function compareFigures(before: Model, after: Model): FigureDifference[] {
  const [old, now] = [figuresOf(before), figuresOf(after)]
  return [...new Set([...old.keys(), ...now.keys()])].flatMap((path) => {
    const [from, to] = [old.get(path) ?? null, now.get(path) ?? null]
    return same(from, to) ? [] : [{ path, from, to }]
  })
}

function figuresOf(model: Model): Map<string, Quantity> {
  const found = new Map<string, Quantity>()
  const walk = (value: unknown, path: string): void => {
    if (typeof value !== 'object' || value === null) return
    if ('origin' in value) {
      const figure = quantitySchema.safeParse(value)
      if (figure.success) found.set(path, figure.data)
      return
    }
    for (const [name, inner] of Object.entries(value))
      walk(inner, path === '' ? stepOf(name, inner) : `${path}.${stepOf(name, inner)}`)
  }
  walk(model, '')
  return found
}

/** Items of lists go by their id, so that another order is no difference. */
function stepOf(name: string, value: unknown): string {
  const id = typeof value === 'object' && value !== null && 'id' in value ? value.id : undefined
  return /^\d+$/.test(name) && typeof id === 'string' ? id : name
}
