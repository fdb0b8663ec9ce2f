import type { ResolvedBuild, ResolvedPart } from '../build/resolve.ts'
import type { CheckResult } from '../check/result.ts'
import { severities } from '../check/severity.ts'
import { refRanges } from './diagram/partsBlock.ts'
import { withinLimits } from './diagram/titleBlock.ts'
import { dataPathWords } from './dataWays.ts'
import { powerWays, powerWords } from './powerWays.ts'
import { driveWords, supplyLines } from './words.ts'

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
  return build.parts
    .filter(({ model }) => model.kind === 'drive')
    .map((drive) => {
      const { ref, bay, serial, role } = drive.part
      const place = bay ? `bay ${bay.slot}` : 'no bay'
      const what = [driveWords(drive.model), role, serial].filter(Boolean).join(', ')
      const path = dataPathWords(build, result.dataPaths, drive)
      const data = path === '' ? 'no data path' : `data ${path}`
      return `  ${place}: ${ref}, ${what}; ${wayTo(drive)}; ${data}`
    })
}

/** "power T1 drive 2 > W2 1 > W5 2", from the supply to the drive. */
function wayTo(drive: ResolvedPart): string {
  const words = powerWords(powerWays(drive))
  return words === '' ? 'not fed' : `power ${words}`
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
