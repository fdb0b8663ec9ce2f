import type { ResolvedBuild, ResolvedConnector, ResolvedJoint, ResolvedPart } from '../build/resolve.ts'
import type { Conductor, SupplyRail } from '../catalog/model.ts'
import { lines, nominal_V, type Line } from '../quantity/rails.ts'
import { readConductor, type ConductorFigures } from './conductors.ts'
import { ContactReader, type ContactFigures } from './contacts.ts'
import { Clusters, planNetwork, type Plan } from './solve/plan.ts'

/**
 * A place that keeps its voltage: an output rail of a supply, or its return. Returns of all supplies stand at zero,
 * since they are bonded to the case.
 */
export interface Source {
  node: number
  part: ResolvedPart
  /** Null for the return. */
  rail: SupplyRail | null
  /** Set point against the rail's nominal voltage, so that the sums work on small numbers. */
  above_V: number
}

/** What a branch stands for. */
export type Branch =
  /** From a supply's output to the connector it feeds, without resistance. */
  | { kind: 'feed'; source: Source; connector: ResolvedConnector }
  /** From end a to end b of a joint. */
  | { kind: 'contact'; joint: ResolvedJoint; contacts: number; figures: ContactFigures }
  /** Along a conductor's `from` to `to`. `index` is its place in the model's `wiring`. */
  | { kind: 'wire'; part: ResolvedPart; conductor: Conductor; index: number; figures: ConductorFigures }

/** All branches of one line. Nodes are connector indices, then the sources of the line. */
export interface LineNetwork {
  line: Line
  branches: readonly Branch[]
  sources: readonly Source[]
  plan: Plan
  /** Branch from each node towards its source; -1 in loops, at sources and where nothing reaches. */
  towardsSource: Int32Array
  /** Branches of loops at each node that has some. */
  inLoops: ReadonlyMap<number, readonly number[]>
  /** With contacts as new, and as at the end of their life. */
  new_ohm: Float64Array
  aged_ohm: Float64Array
  /** Sources of the piece that a node belongs to. */
  sourcesOf(node: number): readonly Source[]
}

export interface PowerNetwork {
  build: ResolvedBuild
  /** In the order of `lines`. */
  byLine: readonly LineNetwork[]
}

/**
 * The power network of a build: for each line the contacts of its joints, the conductors of its parts and the outputs
 * of its supplies.
 *
 * Conventions for models:
 * - A supply's connector names in `feeds` which rail feeds it. An outlet further along a captive lead names the same
 *   rail and is reached by the supply's own `wiring` from the outlet before it.
 * - With `toleranceAt: 'lead-end'` a supply's own wiring drops no voltage, but its currents count.
 * - `wiring` runs from inlets to outlets: `supply` to `out-1` to `out-2`, `power-1` to `bay-1`, `main` to `slot-1`.
 */
export function buildNetwork(build: ResolvedBuild): PowerNetwork {
  const contacts = new ContactReader()
  const conductors = new Map<Conductor, ConductorFigures>()
  const drafts = lines.map((line): Draft => ({
    line,
    branches: [],
    from: [],
    to: [],
    sources: [],
    fresh: [],
    aged: [],
  }))

  for (const part of build.parts) {
    if (part.model.supply) addSources(drafts, part, build.connectors.length)
    addWiring(drafts, part, conductors, build)
  }
  for (const joint of build.joints) if (joint.mating.power) addContacts(drafts, joint, contacts)
  return { build, byLine: drafts.map((draft) => finish(draft, build.connectors.length)) }
}

interface Draft {
  line: Line
  branches: Branch[]
  from: number[]
  to: number[]
  sources: Source[]
  fresh: number[]
  aged: number[]
}

function add(draft: Draft, branch: Branch, from: number, to: number, fresh_ohm: number, aged_ohm: number): void {
  draft.branches.push(branch)
  draft.from.push(from)
  draft.to.push(to)
  draft.fresh.push(fresh_ohm)
  draft.aged.push(aged_ohm)
}

/** One source a rail and one for the return, each feeding the connectors that the supply's own wires do not reach. */
function addSources(drafts: readonly Draft[], part: ResolvedPart, firstFree: number): void {
  const supply = part.model.supply!
  const reachedByWire = new Set(part.model.wiring.map(({ line, to }) => `${line}|${to}`))
  for (const draft of drafts) {
    const { line } = draft
    const made = new Map<string, Source>()
    for (const connector of part.connectors) {
      if (connector.contacts[line] === 0 || reachedByWire.has(`${line}|${connector.connector.id}`)) continue
      const railId = line === 'return' ? '' : connector.connector.feeds?.[line]
      if (railId === undefined) continue
      const rail = line === 'return' ? null : (supply.rails.find(({ id }) => id === railId) ?? null)
      if (line !== 'return' && rail?.rail !== line) continue
      let source = made.get(railId)
      if (!source) {
        source = { node: firstFree + draft.sources.length, part, rail, above_V: aboveNominal_V(rail) }
        draft.sources.push(source)
        made.set(railId, source)
      }
      add(draft, { kind: 'feed', source, connector }, source.node, connector.index, 0, 0)
    }
  }
}

function aboveNominal_V(rail: SupplyRail | null): number {
  if (!rail) return 0
  const { value, low, high } = rail.setPoint_V
  return (value ?? low ?? high ?? nominal_V[rail.rail]) - nominal_V[rail.rail]
}

function addWiring(
  drafts: readonly Draft[],
  part: ResolvedPart,
  known: Map<Conductor, ConductorFigures>,
  build: ResolvedBuild,
): void {
  const atLeadEnd = part.model.supply?.toleranceAt === 'lead-end'
  part.model.wiring.forEach((conductor, index) => {
    const from = part.connectorById.get(conductor.from)
    const to = part.connectorById.get(conductor.to)
    if (!from || !to) return
    let figures = known.get(conductor)
    if (!figures) known.set(conductor, (figures = readConductor(conductor, build.settings)))
    const ohm = atLeadEnd ? 0 : figures.resistance_ohm
    const draft = drafts[lines.indexOf(conductor.line)]!
    add(draft, { kind: 'wire', part, conductor, index, figures }, from.index, to.index, ohm, ohm)
  })
}

function addContacts(drafts: readonly Draft[], joint: ResolvedJoint, reader: ContactReader): void {
  for (const draft of drafts) {
    const contacts = Math.min(joint.a.contacts[draft.line], joint.b.contacts[draft.line])
    if (contacts === 0) continue
    const figures = reader.read(joint, draft.line)
    add(
      draft,
      { kind: 'contact', joint, contacts, figures },
      joint.a.index,
      joint.b.index,
      figures.new_ohm / contacts,
      figures.aged_ohm / contacts,
    )
  }
}

function finish({ line, branches, from, to, sources, fresh, aged }: Draft, connectors: number): LineNetwork {
  const nodes = connectors + sources.length
  const held = new Uint8Array(nodes)
  held.fill(1, connectors)
  const plan = planNetwork({ nodes, from: Int32Array.from(from), to: Int32Array.from(to), held })
  const towardsSource = new Int32Array(nodes).fill(-1)
  plan.pruned.forEach((node, i) => {
    if (plan.reached[node] === 1) towardsSource[node] = plan.via[i]!
  })
  return {
    line,
    branches,
    sources,
    plan,
    towardsSource,
    inLoops: loopsByNode(plan),
    new_ohm: Float64Array.from(fresh),
    aged_ohm: Float64Array.from(aged),
    sourcesOf: groupSources(plan, sources),
  }
}

function loopsByNode({ core, from, to }: Plan): ReadonlyMap<number, readonly number[]> {
  const byNode = new Map<number, number[]>()
  for (const branch of core)
    for (const node of [from[branch]!, to[branch]!]) {
      const others = byNode.get(node)
      if (others) others.push(branch)
      else byNode.set(node, [branch])
    }
  return byNode
}

function groupSources({ nodes, from, to }: Plan, sources: readonly Source[]): (node: number) => readonly Source[] {
  const pieces = new Clusters(nodes)
  for (let i = 0; i < from.length; i++) pieces.join(from[i]!, to[i]!)
  const byPiece = new Map<number, Source[]>()
  for (const source of sources) {
    const piece = pieces.of(source.node)
    const others = byPiece.get(piece)
    if (others) others.push(source)
    else byPiece.set(piece, [source])
  }
  return (node) => byPiece.get(pieces.of(node)) ?? none
}

const none: readonly Source[] = []
