import { connectorName } from '../../build/edits/words.ts'
import type { ResolvedConnector } from '../../build/resolve.ts'
import { counted, listed, nameOf, refsOf } from '../../check/words.ts'
import type { DataResult, ResolvedController } from '../../datapath/result.ts'
import { otherEnd } from '../../electrical/feeding.ts'
import type { Answer, AnswerInput, AnswerLine } from '../answer.ts'

/** Which controllers, how each is set, and what slot it sits in. */
export function answerControllers({ analysis: { build, data }, result }: AnswerInput): Answer {
  const { needsPassThrough } = build.settings.array
  const atFault = new Set(
    result.findings
      .filter(({ rule, accepted }) => !accepted && (rule === 'controller-mode' || rule === 'narrow-slot'))
      .flatMap(({ subjects }) => subjects.slice(0, 1).flatMap(({ part }) => part ?? [])),
  )
  const used = data.controllers.filter((controller) => drivesOf(controller, data).length > 0)
  return {
    id: 'controllers',
    question: 'Which controllers, in which mode and slot?',
    short:
      used.length === 0
        ? 'No controller reaches a drive.'
        : `${listed([...new Set(used.map(({ part }) => part.part.ref))])} ${used.length === 1 ? 'reaches' : 'reach'} the drives; the array ${needsPassThrough ? 'needs them passed through' : 'does not need them passed through'}.`,
    lines: data.controllers.map((controller) => toLine(controller, data, atFault)),
  }
}

const drivesOf = (controller: ResolvedController, data: DataResult) => [
  ...new Set(data.paths.filter((path) => path.controller === controller).map(({ drive }) => drive)),
]

function toLine(controller: ResolvedController, data: DataResult, atFault: ReadonlySet<string>): AnswerLine {
  const { part } = controller
  const drives = drivesOf(controller, data)
  const slot = slotWords(controller)
  const several = part.model.controllers.length > 1 ? `, ${controller.controller.name}` : ''
  const reached = drives.length === 0 ? 'reaches no drive' : `${counted(drives.length, 'drive')}: ${refsOf(drives)}`
  return {
    subject: `${nameOf(part)}${several}`,
    words: `${part.model.name}; ${modeWords(controller)}; ${slot.words}; ${reached}.`,
    look: drives.length > 0 && (atFault.has(part.part.id) || slot.loose),
    parts: [part.part.id],
  }
}

function modeWords({ part, controller: { modes } }: ResolvedController): string {
  const [only] = modes
  if (modes.length === 1) return only === 'combined' ? 'always combines drives' : 'always passes drives through'
  switch (part.part.mode) {
    case 'pass-through':
      return 'set to pass drives through'
    case 'combined':
      return 'set to combine drives'
    default:
      return 'which mode it is set to is not stated'
  }
}

function slotWords({ part, controller: { uplink } }: ResolvedController): { words: string; loose: boolean } {
  const edge = uplink?.connector === undefined ? undefined : part.connectorById.get(uplink.connector)
  if (!uplink || !edge) return { words: 'on the board', loose: false }
  const own = `PCIe ${uplink.generation} x${uplink.lanes}`
  const [joint] = edge.joints
  if (!joint) return { words: `${own}, in no slot`, loose: true }
  return { words: `${own}, in ${slotName(otherEnd(joint, edge))}`, loose: false }
}

function slotName(slot: ResolvedConnector): string {
  const wired = slot.connector.slot
  return `${connectorName(slot)}${wired ? ` (PCIe ${wired.generation}, ${counted(wired.lanes, 'lane')})` : ''}`
}
