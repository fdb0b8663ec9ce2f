import type { ResolvedPart } from '../build/resolve.ts'
import type { Draw } from './attach.ts'
import type { Branch, Source } from './network.ts'
import type { NetworkProblem } from './result.ts'
import type { SolvedLine } from './solveLines.ts'

/** What the network cannot be: rails tied together, loops without resistance, loads without a return. */
export function networkProblems(solved: readonly SolvedLine[], draws: readonly Draw[]): NetworkProblem[] {
  return [...solved.flatMap(joinedSources), ...solved.flatMap(bareLoops), ...draws.flatMap(lackingReturn)]
}

function joinedSources({ network }: SolvedLine): NetworkProblem[] {
  const { line, plan, branches } = network
  if (line === 'return' || network.sources.length < 2) return []
  const pieces = new Set(network.sources.map((source) => network.sourcesOf(source.node)))
  return [...pieces].flatMap((sources): NetworkProblem[] => {
    if (sources.length < 2) return []
    const between = [...plan.core].filter((branch) => sources.includes(network.sourcesOf(plan.to[branch]!)[0]!))
    return [
      {
        kind: 'sources-joined',
        line,
        sources: sources.map(({ part, rail }: Source) => ({ part, rail: rail! })),
        parts: partsOf(between.map((branch) => branches[branch]!)),
      },
    ]
  })
}

function bareLoops({ network, stated }: SolvedLine): NetworkProblem[] {
  return stated.loops.map((loop) => ({
    kind: 'indeterminate-loop',
    line: network.line,
    parts: partsOf(loop.map((branch) => network.branches[branch]!)),
  }))
}

function lackingReturn({ lacksReturn, part, connector, rail }: Draw): NetworkProblem[] {
  return lacksReturn ? [{ kind: 'no-return', part, connector, line: rail }] : []
}

/** Parts that branches run through, each once, supplies left out. */
function partsOf(branches: readonly Branch[]): ResolvedPart[] {
  const parts = branches.flatMap((branch) => {
    if (branch.kind === 'wire') return [branch.part]
    return branch.kind === 'contact' ? [branch.joint.a.part, branch.joint.b.part] : []
  })
  return [...new Set(parts)].filter(({ model }) => !model.supply)
}
