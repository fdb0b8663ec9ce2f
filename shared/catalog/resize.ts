import type { Bay, Conductor, Model, ModelConnector } from './model.ts'

/** Something of a model that can be counted on the real part and set to another number. */
export interface Countable {
  id: 'outlets' | 'sockets' | 'sata-ports'
  label: string
  prefix: string
  least: number
  most: number
}

const countables: Partial<Record<Model['kind'], Countable>> = {
  lead: { id: 'outlets', label: 'Outlets on it', prefix: 'out-', least: 1, most: 12 },
  splitter: { id: 'outlets', label: 'Outlets on it', prefix: 'out-', least: 2, most: 12 },
  adapter: { id: 'outlets', label: 'Outlets on it', prefix: 'out-', least: 1, most: 12 },
  supply: { id: 'sockets', label: 'Sockets for drive leads', prefix: 'drive-', least: 1, most: 16 },
  board: { id: 'sata-ports', label: 'SATA ports', prefix: 'sata-', least: 1, most: 24 },
}

const numbered = (model: Model, prefix: string): ModelConnector[] =>
  model.connectors.filter((connector) => new RegExp(`^${prefix}[0-9]+$`).test(connector.id))

/** What of this model can be counted, with its present number; nothing where it has none to copy. */
export function countableOf(model: Model): (Countable & { count: number }) | undefined {
  const countable = countables[model.kind]
  const count = countable ? numbered(model, countable.prefix).length : 0
  return countable && count > 0 ? { ...countable, count } : undefined
}

/**
 * The model with another number of outlets, sockets or ports. New ones are copies of the last; on a lead they continue
 * the chain, on a splitter they start where the others do. What hung on removed ones goes with them.
 */
export function withCount(model: Model, count: number): Model {
  const countable = countableOf(model)
  if (!countable || count === countable.count || count < countable.least || count > countable.most) return model
  return count < countable.count ? shrink(model, countable.prefix, count) : grow(model, countable.prefix, count)
}

function shrink(model: Model, prefix: string, count: number): Model {
  const gone = new Set(
    numbered(model, prefix)
      .slice(count)
      .map((connector) => connector.id),
  )
  return {
    ...model,
    connectors: model.connectors.filter((connector) => !gone.has(connector.id)),
    wiring: model.wiring.filter((conductor) => !gone.has(conductor.from) && !gone.has(conductor.to)),
    controllers: model.controllers.map((controller) => ({
      ...controller,
      ports: controller.ports.filter((port) => !gone.has(port)),
    })),
  }
}

function grow(model: Model, prefix: string, count: number): Model {
  let grown = model
  for (let number = numbered(model, prefix).length + 1; number <= count; number++) grown = addOne(grown, prefix, number)
  return grown
}

function addOne(model: Model, prefix: string, number: number): Model {
  const last = numbered(model, prefix).at(-1)!
  const id = `${prefix}${number}`
  const added: ModelConnector = { ...last, id, label: last.label.replace(/[0-9]+$/, String(number)) }
  const at = model.connectors.indexOf(last) + 1
  return {
    ...model,
    connectors: [...model.connectors.slice(0, at), added, ...model.connectors.slice(at)],
    wiring: [...model.wiring, ...wiresTo(model, last.id, id)],
    controllers: model.controllers.map((controller) =>
      controller.ports.includes(last.id) ? { ...controller, ports: [...controller.ports, id] } : controller,
    ),
  }
}

/** Wires of a new outlet, copied from the last one's. A last outlet that continues a chain is itself continued. */
function wiresTo(model: Model, last: string, added: string): Conductor[] {
  const feeding = model.wiring.filter((conductor) => conductor.to === last)
  return feeding.map((conductor) => {
    const isChained = conductor.from.startsWith('out-')
    return { ...conductor, from: isChained ? last : conductor.from, to: added }
  })
}

/** A case front as rows and columns of equal bays, numbered by rows from the top left. */
export function withBayGrid(model: Model, rows: number, columns: number): Model {
  const pattern = model.bays[0]
  if (!pattern) return model
  const bays: Bay[] = Array.from({ length: rows * columns }, (_, i) => ({
    ...pattern,
    slot: i + 1,
    row: Math.floor(i / columns),
    column: i % columns,
  }))
  return { ...model, bays }
}

/** Rows and columns of a case's front. */
export const bayGrid = (model: Model): { rows: number; columns: number } => ({
  rows: Math.max(0, ...model.bays.map((bay) => bay.row + 1)),
  columns: Math.max(0, ...model.bays.map((bay) => bay.column + 1)),
})
