import type { ResolvedConnector, ResolvedJoint, ResolvedPart } from '../build/resolve.ts'
import type { Conductor } from '../catalog/model.ts'
import type { Figure } from '../check/result.ts'
import type { Line } from '../quantity/rails.ts'
import { branchCurrents, branchRange, islandOf, mostAtHigh } from './branchValues.ts'
import type { Taken } from './figures.ts'
import type { Island, Islands } from './islands.ts'
import type { Branch, LineNetwork } from './network.ts'
import type { ConductorLoad, ContactLoad, LoadRange, PerMoment, PowerResult } from './result.ts'
import type { SolvedLine } from './solveLines.ts'

/** What every contact and conductor carries. */
export function branchLoads(
  solved: readonly SolvedLine[],
  islands: Islands,
): Pick<PowerResult, 'contacts' | 'conductors' | 'byBranch'> {
  const contacts: ContactLoad[] = []
  const conductors: ConductorLoad[] = []
  const byBranch = solved.map((line) => {
    const { branches } = line.network
    const own = new Array<ContactLoad | ConductorLoad | null>(branches.length)
    for (let i = 0; i < branches.length; i++) {
      const branch = branches[i]!
      const island = islandOf(line, i, islands)
      if (branch.kind === 'contact') contacts.push((own[i] = new ContactOfBranch(line, i, island, branch)))
      else if (branch.kind === 'wire')
        conductors.push((own[i] = new ConductorOfBranch(line, i, island, branch, branch.part)))
      else if (branch.wire)
        conductors.push((own[i] = new ConductorOfBranch(line, i, island, branch.wire, branch.source.part)))
      else own[i] = null
    }
    return own
  })
  return { contacts, conductors, byBranch }
}

/** What all branches share. Ranges are worked out when a verdict asks for them: most hops are far from any limit. */
class BranchLoad {
  readonly branch: number
  readonly current_A: PerMoment
  readonly resistance_ohm: number
  readonly about: boolean
  readonly #solved: SolvedLine
  readonly #island: Island | undefined
  #range_A: LoadRange | undefined

  constructor(solved: SolvedLine, branch: number, island: Island | undefined, figure: Taken | null) {
    this.#solved = solved
    this.#island = island
    this.branch = branch
    this.current_A = branchCurrents(solved, branch, island)
    this.resistance_ohm = solved.network.new_ohm[branch]!
    this.about = solved.about[branch] === 1 || (figure?.about ?? false)
  }

  get range_A(): LoadRange {
    return (this.#range_A ??= branchRange(this.#solved, this.branch, this.#island))
  }

  get most_A(): number {
    return mostAtHigh(this.#solved, this.branch)
  }
}

class ConductorOfBranch extends BranchLoad implements ConductorLoad {
  readonly part: ResolvedPart
  readonly conductor: Conductor
  readonly index: number
  readonly limit_A: number | null
  readonly limitLow_A: number | null
  readonly ampacity: Figure | null

  constructor(
    solved: SolvedLine,
    branch: number,
    island: Island | undefined,
    {
      conductor,
      index,
      figures: { limit },
    }: Pick<Extract<Branch, { kind: 'wire' }>, 'conductor' | 'index' | 'figures'>,
    part: ResolvedPart,
  ) {
    super(solved, branch, island, limit)
    this.part = part
    this.conductor = conductor
    this.index = index
    this.limit_A = limit?.value ?? null
    this.limitLow_A = limit?.low ?? null
    this.ampacity = limit?.figure ?? null
  }
}

class ContactOfBranch extends BranchLoad implements ContactLoad {
  readonly joint: ResolvedJoint
  readonly line: Line
  readonly contacts: number
  readonly limit_A: number | null
  readonly limitLow_A: number | null
  readonly weaker: ResolvedConnector
  readonly rating: Figure | null

  constructor(
    solved: SolvedLine,
    branch: number,
    island: Island | undefined,
    { joint, contacts, figures: { rating, weaker } }: Extract<Branch, { kind: 'contact' }>,
  ) {
    super(solved, branch, island, rating)
    this.joint = joint
    this.line = solved.network.line
    this.contacts = contacts
    this.limit_A = rating ? rating.value * contacts : null
    this.limitLow_A = rating ? rating.low * contacts : null
    this.weaker = joint[weaker === 'alike' ? fedSide(solved.network, branch) : weaker]
    this.rating = rating?.figure ?? null
  }
}

/** The end of a contact that lies away from the source: where both ends are rated alike, the hop bears its name. */
const fedSide = ({ plan, towardsSource }: LineNetwork, branch: number): 'a' | 'b' =>
  towardsSource[plan.from[branch]!] === branch ? 'a' : 'b'
