import type { LineNetwork } from './network.ts'
import type { Columns, Solution } from './solve/solve.ts'

/**
 * The branches that current takes from a source to a node, the source's first. In a loop it follows, at the given
 * column, the branch that brings most.
 */
export function pathToSource(
  { plan, towardsSource, inLoops }: LineNetwork,
  { branch: branchAt }: Columns,
  { current_A }: Solution,
  node: number,
  column: number,
): number[] {
  const path: number[] = []
  const seen = new Set<number>()
  let at = node
  while (plan.held[at] === 0 && plan.reached[at] === 1 && !seen.has(at)) {
    seen.add(at)
    let branch = towardsSource[at]!
    if (branch < 0) {
      let most = 0
      for (const inLoop of inLoops.get(at) ?? []) {
        const brought = (plan.to[inLoop] === at ? 1 : -1) * (current_A[branchAt[inLoop]! + column] ?? 0)
        if (brought > most) {
          most = brought
          branch = inLoop
        }
      }
      if (branch < 0) break
    }
    path.push(branch)
    at = plan.from[branch] === at ? plan.to[branch]! : plan.from[branch]!
  }
  return path.reverse()
}
