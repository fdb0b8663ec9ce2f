import type { Model } from '../catalog/model.ts'
import { quantitySchema, type Quantity } from '../quantity/quantity.ts'

type Node = Record<string, unknown> | unknown[]

const isNode = (value: unknown): value is Node => typeof value === 'object' && value !== null

/** Steps into an object by name, or into a list by an item's `id` or its index. */
function step(node: Node, name: string): { key: string | number; value: unknown } | undefined {
  if (!Array.isArray(node)) return Object.hasOwn(node, name) ? { key: name, value: node[name] } : undefined
  const byId = node.findIndex((item) => isNode(item) && !Array.isArray(item) && item['id'] === name)
  const index = byId >= 0 ? byId : /^\d+$/.test(name) ? Number(name) : -1
  return index >= 0 && index < node.length ? { key: index, value: node[index] } : undefined
}

/** Path steps; a dot inside an id, as in the rail "3.3V", is kept by trying the longest name first. */
function walk(node: Node, names: readonly string[]): (string | number)[] | undefined {
  for (let taken = names.length; taken >= 1; taken--) {
    const found = step(node, names.slice(0, taken).join('.'))
    if (!found) continue
    const rest = names.slice(taken)
    if (rest.length === 0) return quantitySchema.safeParse(found.value).success ? [found.key] : undefined
    if (!isNode(found.value)) continue
    const deeper = walk(found.value, rest)
    if (deeper) return [found.key, ...deeper]
  }
  return undefined
}

/** Finds a figure of a model by its path, as "load.12V.start.peak_A" or "supply.rails.12V1.limit_A". */
export function findFigurePath(model: Model, path: string): (string | number)[] | undefined {
  return walk(model as unknown as Node, path.split('.'))
}

function setAt(node: Node, keys: readonly (string | number)[], value: Quantity): Node {
  const [first, ...rest] = keys
  if (first === undefined) return node
  const copy: Node = Array.isArray(node) ? [...node] : { ...node }
  const slots = copy as Record<string | number, unknown>
  slots[first] = rest.length === 0 ? value : setAt(slots[first] as Node, rest, value)
  return copy
}

/** A copy of the model with the part's own figures written over its own; the model itself when there are none. */
export function applyOverrides(
  model: Model,
  overrides: Readonly<Record<string, Quantity>> | undefined,
  report: (path: string, message: string) => void,
): Model {
  let result = model
  for (const [path, quantity] of Object.entries(overrides ?? {})) {
    const keys = findFigurePath(model, path)
    if (!keys) {
      report(path, `model "${model.id}" has no figure at this path`)
      continue
    }
    result = setAt(result as unknown as Node, keys, quantity) as unknown as Model
  }
  return result
}
