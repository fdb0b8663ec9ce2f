import type { ResolvedPart } from '../../build/resolve.ts'
import type { DataResult, Hop, LanePath } from '../../datapath/result.ts'

/** The parts without which no working data path of the drive is left. */
export function dataFate(data: DataResult, drive: ResolvedPart): Set<ResolvedPart> {
  const working = data.pathsOf(drive).filter((path) => path.fault === null)
  const [first, ...others] = working.map(needsOf)
  return others.reduce((needed, next) => intersection(needed, next), first ?? new Set())
}

function needsOf(path: LanePath): Set<ResolvedPart> {
  return new Set([path.controller.part, ...path.expanders, ...path.hops.flatMap((hop) => [...cablesNeeded(hop)])])
}

/** A wide port lives on as long as one of its lanes does. */
function cablesNeeded(hop: Hop): Set<ResolvedPart> {
  const [first, ...others] = hop.lanes.map((lane) => new Set(lane.through))
  return others.reduce((needed, next) => intersection(needed, next), first ?? new Set())
}

function intersection(a: Set<ResolvedPart>, b: ReadonlySet<ResolvedPart>): Set<ResolvedPart> {
  return new Set([...a].filter((part) => b.has(part)))
}
