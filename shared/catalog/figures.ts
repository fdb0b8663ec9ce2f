import type { Quantity } from '../quantity/quantity.ts'

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

/** In a parsed item only figures have both fields. */
const isFigure = (node: object): node is Quantity => 'value' in node && 'origin' in node

function collect(node: object, path: (string | number)[], found: FoundFigure[]): void {
  if (isFigure(node)) {
    found.push({ path, quantity: node })
    return
  }
  for (const [key, value] of Object.entries(node))
    if (typeof value === 'object' && value !== null)
      collect(value as object, [...path, Array.isArray(node) ? Number(key) : key], found)
}
