import { compareRefs } from '../../build/refOrder.ts'
import type { Purchase } from '../../build/document.ts'
import type { ResolvedBuild, ResolvedPart } from '../../build/resolve.ts'
import type { ModelKind } from '../../catalog/model.ts'
import { connectorCounts, type ConnectorCount } from './connectorCounts.ts'
import { lengthOf_mm } from './lengths.ts'

/** Parts of one model and length: what is bought in one go. */
export interface PartsLine {
  /** Key under which notes about buying are kept. */
  line: string
  kind: ModelKind
  model: string
  name: string
  /** Of cables, where it is known. */
  length_mm: number | null
  connectors: readonly ConnectorCount[]
  refs: readonly string[]
  parts: readonly ResolvedPart[]
  needed: number
  purchase: Purchase | null
  /** Still missing: needed less what is owned and ordered. */
  toBuy: number
}

/** What is to be paid in one currency, for the lines that have a price. */
export interface PartsTotal {
  currency: string
  /** Everything on the diagram. */
  all: number
  /** What is still to buy. */
  toBuy: number
}

/** The parts list of a build. */
export interface PartsList {
  lines: readonly PartsLine[]
  totals: readonly PartsTotal[]
  /** Lines with something to buy and no price: the totals lack them. */
  unpriced: number
  /** Notes about lines that are no longer on the diagram. */
  stale: readonly Purchase[]
}

const kindOrder: readonly ModelKind[] = [
  'case',
  'supply',
  'board',
  'controller',
  'expander',
  'backplane',
  'drive',
  'lead',
  'splitter',
  'adapter',
  'breakout',
  'cable',
  'fan',
  'load',
]

/** Everything that the diagram holds, grouped by model and length, with what people noted about buying it. */
export function partsList(build: ResolvedBuild): PartsList {
  const purchases = new Map(build.document.purchases?.map((purchase) => [purchase.line, purchase]))
  const groups = new Map<string, ResolvedPart[]>()
  for (const part of build.parts) {
    const key = lineOf(part)
    const group = groups.get(key)
    if (group) group.push(part)
    else groups.set(key, [part])
  }
  const lines = [...groups].map(([line, parts]) => lineFrom(line, parts, purchases.get(line) ?? null)).sort(byKind)
  return {
    lines,
    totals: totalsOf(lines),
    unpriced: lines.filter(({ toBuy, purchase }) => toBuy > 0 && purchase?.price === undefined).length,
    stale: [...purchases.values()].filter(({ line }) => !groups.has(line)),
  }
}

/** Parts with an own length are another thing to buy than the model as listed. */
export function lineOf(part: ResolvedPart): string {
  const own = part.part.overrides?.['cable.length_mm']?.value
  return own === undefined || own === null ? part.model.id : `${part.model.id}@${own}`
}

function lineFrom(line: string, parts: readonly ResolvedPart[], purchase: Purchase | null): PartsLine {
  const [first] = parts
  if (!first) throw new Error('a line has parts')
  const { model } = first
  const needed = parts.length
  return {
    line,
    kind: model.kind,
    model: model.id,
    name: model.name,
    length_mm: lengthOf_mm(model),
    connectors: connectorCounts(first),
    refs: parts.map(({ part }) => part.ref).sort(compareRefs),
    parts,
    needed,
    purchase,
    toBuy: Math.max(0, needed - (purchase?.owned ?? 0) - (purchase?.ordered ?? 0)),
  }
}

const byKind = (a: PartsLine, b: PartsLine): number =>
  kindOrder.indexOf(a.kind) - kindOrder.indexOf(b.kind) || (a.name < b.name ? -1 : a.name > b.name ? 1 : 0)

/** Sums in cents: prices are decimal, and tenths of a cent are nobody's price. */
function totalsOf(lines: readonly PartsLine[]): PartsTotal[] {
  const totals = new Map<string, { all: number; toBuy: number }>()
  for (const { purchase, needed, toBuy } of lines) {
    if (purchase?.price === undefined) continue
    const currency = purchase.currency ?? ''
    const total = totals.get(currency) ?? { all: 0, toBuy: 0 }
    const cents = Math.round(purchase.price * 100)
    totals.set(currency, { all: total.all + cents * needed, toBuy: total.toBuy + cents * toBuy })
  }
  return [...totals]
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([currency, { all, toBuy }]) => ({ currency, all: all / 100, toBuy: toBuy / 100 }))
}
