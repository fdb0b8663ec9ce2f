import type { ResolvedBuild, ResolvedConnector, ResolvedPart } from '../build/resolve.ts'
import type { CheckResult } from '../check/result.ts'
import { severities } from '../check/severity.ts'
import { carriesPower, outletsOf } from '../layout/carries.ts'
import { refRanges } from './diagram/partsBlock.ts'
import { withinLimits } from './diagram/titleBlock.ts'
import { driveWords, supplyLines } from './words.ts'

/** Steps of a way that are followed before it is taken for a circle. */
const mostSteps = 24

/**
 * A build in plain text, for a forum or a mail: supply and whose leads, every drive with how it is fed and reached,
 * and what the checker found. Answers what people ask first.
 */
export function textSummary(build: ResolvedBuild, result: CheckResult): string {
  const { document } = build
  const title = document.machine ? `${document.name} (${document.machine})` : document.name
  return [
    title,
    `Within the stated limits: ${withinLimits(result).words}`,
    ...(result.weakestHop ? [result.weakestHop] : []),
    ...section('Supplies', suppliesOf(build)),
    ...section('Leads and splitters', modelLines(build, ['lead', 'splitter', 'adapter'])),
    ...section('Drives', driveLines(build, result)),
    ...section('Controllers and data cables', modelLines(build, hostKinds)),
    ...section('Findings', findingLines(result)),
    '',
    'Computed from stated figures. Measure before mating; never mix modular leads between supply families.',
    '',
  ].join('\n')
}

const hostKinds = ['board', 'controller', 'expander', 'backplane', 'breakout', 'cable']

const section = (title: string, lines: readonly string[]): string[] => (lines.length === 0 ? [] : ['', title, ...lines])

const suppliesOf = (build: ResolvedBuild): string[] =>
  build.parts
    .filter(({ model }) => model.kind === 'supply')
    .map(({ part, model }) => `  ${part.ref}: ${model.name}; ${supplyLines(model, 20).join(', ')}`)

function modelLines(build: ResolvedBuild, kinds: readonly string[]): string[] {
  const refs = new Map<string, string[]>()
  for (const { part, model } of build.parts)
    if (kinds.includes(model.kind)) {
      const family = model.kind === 'lead' && model.pinoutFamily ? `, pinout ${model.pinoutFamily}` : ''
      const name = `${model.name}${family}`
      refs.set(name, [...(refs.get(name) ?? []), part.ref])
    }
  return [...refs].map(([name, all]) => `  ${refRanges(all)}: ${name}`)
}

function driveLines(build: ResolvedBuild, result: CheckResult): string[] {
  const paths = new Map(result.dataPaths.filter((path) => path.works).map((path) => [path.drive, path]))
  return build.parts
    .filter(({ model }) => model.kind === 'drive')
    .map((drive) => {
      const { ref, bay, serial, role } = drive.part
      const path = paths.get(drive.part.id)
      const host = path && build.partById.get(path.controllerPart)
      const port = host?.connectorById.get(path?.port ?? '')?.connector.label ?? path?.port
      const place = bay ? `bay ${bay.slot}` : 'no bay'
      const what = [driveWords(drive.model), role, serial].filter(Boolean).join(', ')
      const data = host ? `data ${host.part.ref} ${port}, lane ${path?.lane ?? 0}` : 'no data path'
      return `  ${place}: ${ref}, ${what}; ${wayTo(drive)}; ${data}`
    })
}

/** "power T1 drive 2 > W2 1 > W5 2", from the supply to the drive. */
function wayTo(drive: ResolvedPart): string {
  const steps: string[] = []
  let inlets: readonly ResolvedConnector[] = drive.connectors
  for (let step = 0; step < mostSteps; step++) {
    const joint = inlets.flatMap(({ joints }) => joints).find(({ mating }) => mating.power)
    if (!joint) return steps.length === 0 ? 'not fed' : `power open at ${steps.join(' > ')}`
    const outlet: ResolvedConnector = inlets.includes(joint.a) ? joint.b : joint.a
    steps.unshift(`${outlet.part.part.ref} ${outlet.connector.label}`)
    if (outlet.part.model.kind === 'supply') return `power ${steps.join(' > ')}`
    inlets = inletsBehind(outlet)
  }
  return `power in a circle at ${steps.join(' > ')}`
}

/** Inlets whose wires lead to an outlet, those with a partner first. */
function inletsBehind({ part, connector }: ResolvedConnector): ResolvedConnector[] {
  const outlets = outletsOf(part)
  const back = new Set([connector.id])
  for (const id of back)
    for (const { from, to, line } of part.model.wiring) if (to === id && line !== 'return') back.add(from)
  return part.connectors
    .filter((one) => carriesPower(one) && back.has(one.connector.id) && !outlets.has(one.connector.id))
    .sort((a, b) => Math.sign(b.joints.length) - Math.sign(a.joints.length))
}

function findingLines({ findings }: CheckResult): string[] {
  return severities.flatMap((severity) =>
    findings
      .filter((finding) => finding.severity === severity)
      .map((finding) => {
        const accepted = finding.accepted ? ` (accepted: ${finding.accepted.reason})` : ''
        return `  ${severity}: ${finding.message}${finding.accepted ? accepted : ` ${finding.remedy}`}`
      }),
  )
}
