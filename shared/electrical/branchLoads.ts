import { branchCurrents, branchRange, islandOf } from './branchValues.ts'
import type { Islands } from './islands.ts'
import type { LineNetwork } from './network.ts'
import type { SolvedLine } from './solveLines.ts'
import type { ConductorLoad, ContactLoad, PowerResult } from './result.ts'

/** What every contact and conductor carries. */
export function branchLoads(
  solved: readonly SolvedLine[],
  islands: Islands,
): Pick<PowerResult, 'contacts' | 'conductors' | 'byBranch'> {
  const contacts: ContactLoad[] = []
  const conductors: ConductorLoad[] = []
  const byBranch = solved.map(({ network }) => new Array<ContactLoad | ConductorLoad | null>(network.branches.length))
  solved.forEach((line, l) => {
    const { network } = line
    const own = byBranch[l]!.fill(null)
    network.branches.forEach((branch, i) => {
      const wire = branch.kind === 'feed' ? branch.wire && { ...branch.wire, part: branch.source.part } : null
      if (branch.kind === 'feed' && !wire) return
      const island = islandOf(line, i, islands)
      const current_A = branchCurrents(line, i, island)
      const range_A = branchRange(line, i, island)
      const resistance_ohm = network.new_ohm[i]!
      const about = line.about[i] === 1
      if (branch.kind !== 'contact') {
        const { part, conductor, index, figures } = branch.kind === 'wire' ? branch : wire!
        const { limit } = figures
        const load: ConductorLoad = {
          branch: i,
          part,
          conductor,
          index,
          current_A,
          range_A,
          resistance_ohm,
          limit_A: limit?.value ?? null,
          limitLow_A: limit?.low ?? null,
          ampacity: limit?.figure ?? null,
          about: about || (limit?.about ?? false),
        }
        own[i] = load
        conductors.push(load)
        return
      }
      const { joint, contacts: count, figures } = branch
      const { rating, weaker } = figures
      const load: ContactLoad = {
        branch: i,
        joint,
        line: network.line,
        contacts: count,
        current_A,
        range_A,
        resistance_ohm,
        limit_A: rating ? rating.value * count : null,
        limitLow_A: rating ? rating.low * count : null,
        weaker: joint[weaker === 'alike' ? fedSide(network, i) : weaker],
        rating: rating?.figure ?? null,
        about: about || (rating?.about ?? false),
      }
      own[i] = load
      contacts.push(load)
    })
  })
  return { contacts, conductors, byBranch }
}

/** The end of a contact that lies away from the source: where both ends are rated alike, the hop bears its name. */
const fedSide = ({ plan, towardsSource }: LineNetwork, branch: number): 'a' | 'b' =>
  towardsSource[plan.from[branch]!] === branch ? 'a' : 'b'
