import { rankRefs } from '../build/refOrder.ts'
import type { ResolvedBuild, ResolvedConnector, ResolvedPart } from '../build/resolve.ts'
import { follow } from './follow.ts'
import { controllerRate, driveRate, expanderRate, lowestRate, nvmeRates, rateLane, type EndRate } from './hopRate.ts'
import { activePorts, controllersOf, laneCount, type ActivePort } from './parts.ts'
import { protocolFault } from './protocol.ts'
import type { ExpanderLoop, Hop, HopLane, LanePath, ResolvedController, Reversal } from './result.ts'

export interface Traced {
  controllers: ResolvedController[]
  paths: LanePath[]
  reversals: Reversal[]
  hops: Hop[]
  loops: ExpanderLoop[]
}

/** What one active part reaches in one hop. */
interface Reached {
  expanders: Map<ResolvedPart, HopLane[]>
  drives: HopLane[]
  /** Cables passed the wrong way on lanes that end at no phy. */
  loose: Reversal[]
}

interface Tracer {
  ports: readonly (ActivePort | undefined)[]
  /** What an expander reaches does not hang on the controller. */
  fromExpander: Map<ResolvedPart, Reached>
  hops: Map<string, Hop>
  reversals: Map<string, Reversal>
}

/** Follows every lane from every controller to every drive, through any number of expanders, loops included. */
export function trace(build: ResolvedBuild): Traced {
  const controllers = controllersOf(build)
  const tracer: Tracer = {
    ports: activePorts(build),
    fromExpander: new Map(),
    hops: new Map(),
    reversals: new Map(),
  }
  const paths: LanePath[] = []
  const loops: ExpanderLoop[] = []
  for (const controller of controllers) traceController(controller, tracer, paths, loops)
  return {
    controllers,
    paths: sortPaths(build, controllers, paths),
    reversals: [...tracer.reversals.values()],
    hops: [...tracer.hops.values()],
    loops,
  }
}

function traceController(
  controller: ResolvedController,
  tracer: Tracer,
  paths: LanePath[],
  loops: ExpanderLoop[],
): void {
  const { part } = controller
  const start = reach(connectorsOf(part, controller.controller.ports), controllerRate(controller), tracer)
  const waysTo = new Map<ResolvedPart, Hop[]>()
  const queue: { from: ResolvedPart; reached: Reached; way: Hop[] }[] = [{ from: part, reached: start, way: [] }]

  for (let next = queue.shift(); next; next = queue.shift()) {
    const { from, reached, way } = next
    noteReversals(tracer, reached.loose)
    for (const path of pathsTo(controller, from, reached.drives, way, tracer)) paths.push(path)
    for (const [expander, lanes] of reached.expanders) {
      const came = way.at(-1)?.from
      if (expander === came) continue
      if (waysTo.has(expander)) {
        loops.push({ controller, expander })
        continue
      }
      const hop = keepHop(tracer, `${ownerKey(from, controller, way)}>${expander.index}`, { from, to: expander, lanes })
      const onward = [...way, hop]
      waysTo.set(expander, onward)
      queue.push({ from: expander, reached: reachFromExpander(expander, tracer), way: onward })
    }
  }
}

const ownerKey = (from: ResolvedPart, controller: ResolvedController, way: readonly Hop[]): string =>
  way.length === 0 ? `${from.index}.${controller.controller.id}` : `${from.index}`

function connectorsOf(part: ResolvedPart, ids: readonly string[]): ResolvedConnector[] {
  return ids.flatMap((id) => part.connectorById.get(id) ?? [])
}

function reachFromExpander(expander: ResolvedPart, tracer: Tracer): Reached {
  const known = tracer.fromExpander.get(expander)
  if (known) return known
  const made = reach(connectorsOf(expander, expander.model.expander?.ports ?? []), expanderRate(expander), tracer)
  tracer.fromExpander.set(expander, made)
  return made
}

function reach(connectors: readonly ResolvedConnector[], rate: EndRate, { ports }: Tracer): Reached {
  const reached: Reached = { expanders: new Map(), drives: [], loose: [] }
  for (const connector of connectors)
    for (let lane = 0; lane < laneCount(connector); lane++) {
      const { lanes, reversals } = follow(connector, lane, ports)
      if (lanes.length === 0) reached.loose.push(...reversals)
      for (const found of lanes) {
        const target = found.to.part
        const kind = ports[found.to.index]?.kind
        if (kind === 'drive') reached.drives.push(rateLane(found, [rate, driveRate(target)]))
        else if (kind === 'expander' && target !== connector.part) {
          const others = reached.expanders.get(target) ?? []
          others.push(rateLane(found, [rate, expanderRate(target)]))
          reached.expanders.set(target, others)
        }
      }
    }
  return reached
}

/** One path for each port of a drive that a lane ends at; the lanes of an NVMe drive are one link. */
function pathsTo(
  controller: ResolvedController,
  from: ResolvedPart,
  lanes: readonly HopLane[],
  way: readonly Hop[],
  tracer: Tracer,
): LanePath[] {
  const links = new Map<string, HopLane[]>()
  for (const lane of lanes) {
    const drive = lane.to.part.model.drive
    if (!drive) continue
    const isNvme = drive.protocol === 'nvme'
    if (!isNvme && lane.toLane >= drive.ports) continue
    const key = isNvme ? `${lane.to.part.index}` : `${lane.to.index}.${lane.toLane}<${lane.from.index}.${lane.fromLane}`
    const link = links.get(key)
    if (link) link.push(lane)
    else links.set(key, [lane])
  }
  return [...links].flatMap(([key, link]) => {
    const first = link[0]
    if (!first) return []
    const hop = keepHop(tracer, `${ownerKey(from, controller, way)}>${key}`, { from, to: first.to.part, lanes: link })
    return makePath(controller, [...way, hop], tracer)
  })
}

function makePath(controller: ResolvedController, hops: readonly Hop[], tracer: Tracer): LanePath[] {
  const firsts = hops.flatMap((hop) => hop.lanes[0] ?? [])
  const first = firsts[0]
  const last = firsts.at(-1)
  const drive = last?.to.part.model.drive
  if (!first || !last || !drive) return []
  const expanders = hops.slice(0, -1).map((hop) => hop.to)
  const reversed = firsts.find((lane) => lane.reversed)?.reversed
  noteReversals(
    tracer,
    hops.flatMap((hop) => hop.lanes.flatMap((lane) => lane.reversed ?? [])),
  )
  const isNvme = drive.protocol === 'nvme'
  const rates = isNvme
    ? nvmeRates(controller, last.to.part)
    : firsts.flatMap(({ rate_Gbps, limitedBy }) => (limitedBy ? { part: limitedBy, rate_Gbps } : []))
  return [
    {
      controller,
      port: first.from,
      lane: first.fromLane,
      drive: last.to.part,
      driveConnector: last.to,
      drivePort: isNvme ? 0 : last.toLane,
      hops,
      joints: firsts.flatMap((lane) => lane.joints),
      through: firsts.flatMap((lane, i) => [...lane.through, ...(expanders[i] ? [expanders[i]] : [])]),
      expanders,
      ...lowestRate(rates),
      fault:
        protocolFault(controller, expanders, drive.protocol) ??
        (reversed ? { kind: 'reversed', cable: reversed.cable } : null),
    },
  ]
}

function keepHop(tracer: Tracer, key: string, made: Hop): Hop {
  const known = tracer.hops.get(key)
  if (known) return known
  tracer.hops.set(key, made)
  return made
}

function noteReversals(tracer: Tracer, reversals: readonly Reversal[]): void {
  for (const reversal of reversals)
    tracer.reversals.set(`${reversal.cable.index}.${reversal.enteredAt.index}`, reversal)
}

function sortPaths(build: ResolvedBuild, controllers: readonly ResolvedController[], paths: LanePath[]): LanePath[] {
  const ranks = rankRefs(build.parts.map((part) => part.part.ref))
  const places = new Map(controllers.map((controller, place) => [controller, place]))
  const rank = (part: ResolvedPart): number => ranks[part.index] ?? 0
  return paths.sort(
    (a, b) =>
      rank(a.drive) - rank(b.drive) ||
      a.drivePort - b.drivePort ||
      (places.get(a.controller) ?? 0) - (places.get(b.controller) ?? 0) ||
      a.port.index - b.port.index ||
      a.lane - b.lane,
  )
}
