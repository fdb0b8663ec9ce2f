import type { ResolvedBuild, ResolvedConnector, ResolvedJoint, ResolvedPart } from '../build/resolve.ts'
import type { Conductor, SupplyRail } from '../catalog/model.ts'
import { lines, type Line, type Rail } from '../quantity/rails.ts'
import type { ConductorFigures } from './conductors.ts'
import { readContact, type ContactFigures } from './contacts.ts'
import { add, finish, type Draft } from './draft.ts'
import { readPartWiring, type PartWiring } from './partWiring.ts'
import type { Plan } from './solve/plan.ts'
import { addConverter, addSources } from './sources.ts'

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
    if (part.model.wiring.length === 0 && !part.model.supply) continue
    const wiring = readPartWiring(part, build.settings)
    if (part.model.supply) addSources(drafts, part, build.connectors.length, wiring)
    addWiring(drafts, part, wiring)
  }
  const joined = new Set<number>()
  for (const joint of build.joints) {
    const { a, b, mating } = joint
    const ends = Math.min(a.index, b.index) * build.connectors.length + Math.max(a.index, b.index)
    // Drawing a joint twice does not make a second plug: it must not halve the current.
    if (!mating.power || joined.has(ends)) continue
    joined.add(ends)
    addContacts(drafts, joint)
  }
  return { build, byLine: finishAll(drafts, build) }
}

function addWiring(drafts: readonly Draft[], part: ResolvedPart, { between }: PartWiring): void {
  const first = part.connectors[0]?.index ?? 0
  for (const { line, from, to, ohm, conductor, index, figures } of between)
    add(drafts[line]!, { kind: 'wire', part, conductor, index, figures }, first + from, first + to, ohm, ohm)
}

function addContacts(drafts: readonly Draft[], joint: ResolvedJoint): void {
  const { a, b } = joint
  for (const draft of drafts) {
    const contacts = Math.min(a.contacts[draft.line], b.contacts[draft.line])
    if (contacts === 0) continue
    const figures = readContact(joint, draft.line)
    const { new_ohm, aged_ohm } = figures
    add(draft, { kind: 'contact', joint, contacts, figures }, a.index, b.index, new_ohm / contacts, aged_ohm / contacts)
  }
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
