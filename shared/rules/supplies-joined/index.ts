import { partSubject, railSubject } from '../../check/subjects.ts'
import { listed, refsOf } from '../../check/words.ts'
import { lineName } from '../../electrical/lines.ts'
import { railName } from '../../electrical/names.ts'
import type { NetworkProblem } from '../../electrical/result.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  problem: Extract<NetworkProblem, { kind: 'sources-joined' }>
  supplies: number
}

export const suppliesJoined = defineRule<Facts>({
  meta: {
    id: 'supplies-joined',
    title: 'Supply rails tied together',
    severities: ['danger', 'fault'],
    finds: 'Two supplies, or two separately limited rails of one supply, that meet on a backplane, board or lead.',
    why: 'Two supplies push current into each other and neither limit protects the wiring any more; two limited rails of one supply share by chance, and the one that carries more trips first.',
    needs: ['supply rail of each outlet', 'wiring inside backplanes and boards'],
    sources: ['S17', 'S20'],
  },
  check({ power }) {
    return power.problems.flatMap((problem) => {
      if (problem.kind !== 'sources-joined') return []
      const supplies = new Set(problem.sources.map(({ part }) => part)).size
      return [
        {
          severity: supplies > 1 ? ('danger' as const) : ('fault' as const),
          subjects: [
            ...problem.sources.map(({ part, rail }) => railSubject(part, rail.id)),
            ...problem.parts.map(partSubject),
          ],
          detail: problem.line,
          facts: { problem, supplies },
        },
      ]
    })
  },
  words({ facts: { problem, supplies } }) {
    const through = problem.parts.length > 0 ? ` through ${refsOf(problem.parts)}` : ''
    return {
      message: `${listed(problem.sources.map(({ part, rail }) => railName(part, rail)))} are tied together on ${lineName[problem.line]}${through}. The currents shown share by resistance only.`,
      remedy:
        supplies > 1
          ? 'Feed each backplane, board and lead from one supply only.'
          : 'Feed each backplane and board from one rail only, or use a supply whose 12 V is a single rail.',
    }
  },
})
