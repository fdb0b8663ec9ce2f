import type { ResolvedBuild, ResolvedConnector, ResolvedJoint, ResolvedPart } from '../build/resolve.ts'
import { supplyInside, type Conductor, type Converter, type SupplyRail } from '../catalog/model.ts'
import { lines, nominal_V, type Line, type Rail } from '../quantity/rails.ts'
import { readConductor, type ConductorFigures } from './conductors.ts'
import { ContactReader, type ContactFigures } from './contacts.ts'
import { Clusters, planNetwork, type Plan } from './solve/plan.ts'

/**
 * A place that keeps its voltage: an output rail of a supply or converter, or a supply's return. Returns of all
 * supplies stand at zero, since they are bonded to the case.
 */
export interface Source {
  node: number
  part: ResolvedPart
  /** Null for the return. */
  rail: SupplyRail | null
  /** Set point against the rail's nominal voltage, so that the sums work on small numbers. */
  above_V: number
  /** Where a converter takes from what it gives here. */
  takes?: ConverterInput
}

/** The input of a converter, and what it takes there for each ampere that it gives. */
export interface ConverterInput {
  rail: Rail
  connector: ResolvedConnector
  ampere: number
}

/** What a branch stands for. */
export type Branch =
  /** From an output to the connector it feeds; along the first stretch of a captive lead where its wire is given. */
  | { kind: 'feed'; source: Source; connector: ResolvedConnector; wire: FeedWire | null }
  /** From end a to end b of a joint. */
  | { kind: 'contact'; joint: ResolvedJoint; contacts: number; figures: ContactFigures }
  /** Along a conductor's `from` to `to`. `index` is its place in the model's `wiring`. */
  | { kind: 'wire'; part: ResolvedPart; conductor: Conductor; index: number; figures: ConductorFigures }

export interface FeedWire {
  conductor: Conductor
  index: number
  figures: ConductorFigures
}

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
 *   rail and is reached by the supply's own `wiring` from the outlet before it. Wiring from `inside` is the stretch
 *   from the supply's board to the first connector.
 * - A converter's rail stands up where what it is made from arrives.
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

  const readWire = (conductor: Conductor): ConductorFigures => {
    let figures = conductors.get(conductor)
    if (!figures) conductors.set(conductor, (figures = readConductor(conductor, build.settings)))
    return figures
  }
  for (const part of build.parts) {
    if (part.model.supply) addSources(drafts, part, build.connectors.length, readWire)
    addWiring(drafts, part, readWire)
  }
  const joined = new Set<string>()
  for (const joint of build.joints) {
    const ends = `${Math.min(joint.a.index, joint.b.index)} ${Math.max(joint.a.index, joint.b.index)}`
    // Drawing a joint twice does not make a second plug: it must not halve the current.
    if (!joint.mating.power || joined.has(ends)) continue
    joined.add(ends)
    addContacts(drafts, joint, contacts)
  }
  return { build, byLine: finishAll(drafts, build) }
}

/** Lines stand from the highest rail down: when a converter's output is laid, its input is known to be live or not. */
function finishAll(drafts: readonly Draft[], build: ResolvedBuild): LineNetwork[] {
  const converting = build.parts.filter(({ model }) => model.converters.length > 0)
  const finished: LineNetwork[] = []
  for (const draft of drafts) {
    for (const part of converting)
      for (const converter of part.model.converters)
        if (converter.rail === draft.line) addConverter(draft, part, converter, finished, build.connectors.length)
    finished.push(finish(draft, build.connectors.length))
  }
  return finished
}

/** Share of its input that a converter hands on where nobody states it, at most: common practice for small ones. */
const worstEfficiency = 0.8

function addConverter(
  draft: Draft,
  part: ResolvedPart,
  { id, from, rail, feeds, setPoint_V, limit_A, efficiency }: Converter,
  above: readonly LineNetwork[],
  firstFree: number,
): void {
  const connector = part.connectorById.get(from.connector)
  const input = above[lines.indexOf(from.rail)]
  if (!connector || input?.plan.reached[connector.index] !== 1) return
  const made: SupplyRail = { id, rail, setPoint_V, limit_A }
  const kept = efficiency.value ?? efficiency.low ?? worstEfficiency
  const source: Source = {
    node: firstFree + draft.sources.length,
    part,
    rail: made,
    above_V: aboveNominal_V(made),
    takes: {
      rail: from.rail,
      connector,
      ampere: nominal_V[rail] / (nominal_V[from.rail] * (kept > 0 && kept <= 1 ? kept : worstEfficiency)),
    },
  }
  draft.sources.push(source)
  for (const fed of feeds) {
    const outlet = part.connectorById.get(fed)
    if (outlet && outlet.contacts[rail] > 0)
      add(draft, { kind: 'feed', source, connector: outlet, wire: null }, source.node, outlet.index, 0, 0)
  }
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
function addSources(
  drafts: readonly Draft[],
  part: ResolvedPart,
  firstFree: number,
  readWire: (conductor: Conductor) => ConductorFigures,
): void {
  const supply = part.model.supply!
  const reachedByWire = new Set<string>()
  const firstWires = new Map<string, FeedWire[]>()
  part.model.wiring.forEach((conductor, index) => {
    const end = `${conductor.line}|${conductor.to}`
    if (conductor.from !== supplyInside) return reachedByWire.add(end)
    const wire = { conductor, index, figures: readWire(conductor) }
    firstWires.set(end, [...(firstWires.get(end) ?? []), wire])
  })
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
      for (const wire of firstWires.get(`${line}|${connector.connector.id}`) ?? [null]) {
        const ohm = wire && supply.toleranceAt === 'socket' ? wire.figures.resistance_ohm : 0
        add(draft, { kind: 'feed', source, connector, wire }, source.node, connector.index, ohm, ohm)
      }
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
  readWire: (conductor: Conductor) => ConductorFigures,
): void {
  const atLeadEnd = part.model.supply?.toleranceAt === 'lead-end'
  part.model.wiring.forEach((conductor, index) => {
    const from = part.connectorById.get(conductor.from)
    const to = part.connectorById.get(conductor.to)
    if (!from || !to) return
    const figures = readWire(conductor)
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
