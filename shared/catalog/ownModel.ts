import type { Quantity } from '../quantity/quantity.ts'
import { figuresIn } from './figures.ts'
import type { Model } from './model.ts'

/** An id made of a name, not among the taken ones; own models carry "own-" so that they never hide a shared one. */
export function idOfName(name: string, taken: ReadonlySet<string>, prefix: 'own-' | '' = 'own-'): string {
  const plain = name
    .normalize('NFKD')
    .toLowerCase()
    .replace(/\p{M}/gu, '')
    .replace(/[^a-z0-9.]+/g, '-')
    .replace(/\.(?![a-z0-9])|(?<![a-z0-9])\./g, '-')
    .replace(/-+/g, '-')
    .slice(0, 48)
    .replace(/^[-.]+|[-.]+$/g, '')
  const base = `${prefix}${plain || 'model'}`
  if (!taken.has(base)) return base
  let number = 2
  while (taken.has(`${base}-${number}`)) number++
  return `${base}-${number}`
}

/** A figure taken over from another model: what was read or measured there is only a default here. */
function taken(quantity: Quantity): Quantity {
  if (quantity.origin !== 'maker' && quantity.origin !== 'measured') return quantity
  const { by: _by, on: _on, ...rest } = quantity
  return { ...rest, origin: 'class default' }
}

/**
 * A new model that starts from another one. Its figures are carried as class defaults, with their documents, until
 * somebody reads the real part's label.
 */
export function startFrom(pattern: Model, identity: { id: string; name: string }): Model {
  const model = structuredCloneOf(pattern)
  for (const { path, quantity } of figuresIn(model)) {
    const own = taken(quantity)
    if (own !== quantity) setAt(model, path, own)
  }
  delete model.summary
  delete model.note
  return { ...model, ...identity }
}

/** Plain data only: models hold nothing else. */
const structuredCloneOf = <T>(value: T): T => JSON.parse(JSON.stringify(value)) as T

function setAt(item: object, path: readonly (string | number)[], value: Quantity): void {
  const last = path.at(-1)
  if (last === undefined) return
  const parent = path.slice(0, -1).reduce<unknown>((node, key) => (node as Record<string | number, unknown>)[key], item)
  ;(parent as Record<string | number, unknown>)[last] = value
}
