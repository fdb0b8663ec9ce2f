import { quantitySchema, type Quantity } from '../quantity/quantity.ts'

/** A figure somewhere inside a model, class or connector type, with the way to it. */
export interface FoundFigure {
  path: (string | number)[]
  quantity: Quantity
}

/** Every figure inside a parsed catalog item, in the order of the item. */
export function figuresIn(item: object): FoundFigure[] {
  const found: FoundFigure[] = []
  collect(item, [], found)
  return found
}

function collect(node: object, path: (string | number)[], found: FoundFigure[]): void {
  if ('value' in node && 'origin' in node) {
    const parsed = quantitySchema.safeParse(node)
    if (parsed.success) found.push({ path, quantity: parsed.data })
    return
  }
  for (const [key, value] of Object.entries(node))
    if (typeof value === 'object' && value !== null)
      collect(value as object, [...path, Array.isArray(node) ? Number(key) : key], found)
}
