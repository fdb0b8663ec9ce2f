import type { ResolvedBuild, ResolvedConnector, ResolvedPart } from '../build/resolve.ts'
import type { DataPath } from '../check/result.ts'

/** The best path to each port of a drive. */
function pathsOf(paths: readonly DataPath[], drive: ResolvedPart): DataPath[] {
  const own = paths.filter((path) => path.drive === drive.part.id)
  const best = new Map<number, DataPath>()
  for (const path of own) if (path.works || !best.has(path.drivePort)) best.set(path.drivePort, betterOf(best, path))
  return [...best.values()].sort((a, b) => a.drivePort - b.drivePort)
}

function betterOf(best: ReadonlyMap<number, DataPath>, path: DataPath): DataPath {
  const known = best.get(path.drivePort)
  return known?.works ? known : path
}

/** "B1 slot 2 > K1 port A, lane 0 > W8 leg 1", from the slot to the plug or bay. */
function dataWords(build: ResolvedBuild, path: DataPath): string {
  const host = build.partById.get(path.controllerPart)
  if (!host) return ''
  const port = host.connectorById.get(path.port)
  const slot = slotOf(host, path)
  const steps = [
    ...(slot ? [`${slot.part.part.ref} ${slot.connector.label}`] : []),
    `${host.part.ref} ${port?.connector.label ?? path.port}${laneWords(port, path.lane)}`,
    ...partsPassed(build, host, path),
  ]
  const words = steps.join(' > ')
  return path.works ? words : `${words}: no link${path.reason ? `, ${path.reason}` : ''}`
}

/** A port of one lane needs no lane number. */
const laneWords = (port: ResolvedConnector | undefined, lane: number): string =>
  (port?.type.data?.lanes ?? 1) > 1 ? `, lane ${lane}` : ''

function slotOf(host: ResolvedPart, path: DataPath): ResolvedConnector | undefined {
  const uplink = host.model.controllers.find(({ id }) => id === path.controller)?.uplink?.connector
  const edge = uplink === undefined ? undefined : host.connectorById.get(uplink)
  const joint = edge?.joints[0]
  return joint && (joint.a === edge ? joint.b : joint.a)
}

/** Each part between host and drive with the connector that tells its branch: "W8 leg 1", "U1 bay 5", "W10". */
function partsPassed(build: ResolvedBuild, host: ResolvedPart, path: DataPath): string[] {
  const steps: string[] = []
  let at = host
  let enteredAt: ResolvedConnector | undefined
  for (const id of path.joints) {
    const joint = build.jointById.get(id)
    if (!joint) continue
    const [leaving, entering] = joint.a.part === at ? [joint.a, joint.b] : [joint.b, joint.a]
    if (at !== host) steps.push(branchWords(at, enteredAt, leaving))
    at = entering.part
    enteredAt = entering
  }
  return steps
}

function branchWords(part: ResolvedPart, entered: ResolvedConnector | undefined, left: ResolvedConnector): string {
  const { ref } = part.part
  const ends = part.connectors.filter(({ type }) => type.data !== undefined)
  const alike = (one: ResolvedConnector) => ends.filter(({ type }) => type === one.type).length
  if (part.model.expander && entered) return `${ref} ${entered.connector.label}, ${left.connector.label}`
  if (ends.length <= 2) return ref
  if (entered && alike(entered) > alike(left)) return `${ref} ${entered.connector.label}`
  return `${ref} ${left.connector.label}`
}

/** How a drive is reached, in words; one way for each of its ports where they differ. Empty: it is not. */
export function dataPathWords(build: ResolvedBuild, paths: readonly DataPath[], drive: ResolvedPart): string {
  return [...new Set(pathsOf(paths, drive).map((path) => dataWords(build, path)))].join(' and ')
}
