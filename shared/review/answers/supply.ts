import { connectorName } from '../../build/edits/words.ts'
import type { ResolvedConnector, ResolvedPart } from '../../build/resolve.ts'
import { amount, counted, listed, nameOf } from '../../check/words.ts'
import { otherEnd, suppliesOf } from '../../electrical/feeding.ts'
import type { Answer, AnswerInput, AnswerLine } from '../answer.ts'

/** Which supply, and whose leads hang on it: the question that saves drives. */
export function answerSupply({ analysis: { build }, result }: AnswerInput): Answer {
  const supplies = suppliesOf(build)
  const foreign = new Set(
    result.findings
      .filter(({ rule }) => rule === 'foreign-lead')
      .flatMap(({ subjects }) => subjects.flatMap(({ kind, part }) => (kind === 'part' && part ? [part] : []))),
  )
  const lines = supplies.flatMap((supply) => [supplyLine(supply), ...leadLines(supply, foreign)])
  const doubtful = lines.filter(({ look }) => look).length
  const names = listed(supplies.map(({ part, model }) => `${part.ref}, ${model.name}`))
  return {
    id: 'supply',
    question: 'Which supply, and whose leads?',
    short:
      supplies.length === 0
        ? 'No supply is drawn.'
        : `${names}. ${doubtful === 0 ? 'Every lead is fixed to it, of its own family, or proven.' : `${counted(doubtful, 'line')} to look at: a lead that fits may still be wired otherwise.`}`,
    lines,
  }
}

function supplyLine(supply: ResolvedPart): AnswerLine {
  const { supply: figures, pinoutFamily } = supply.model
  const total = figures?.total_W.value ?? null
  const watts = total === null ? 'rated power unknown' : amount(total, 'W')
  const modular = supply.connectors.some(isModular)
  const family = modular ? `modular, pinout family ${pinoutFamily ? `"${pinoutFamily}"` : 'not stated'}` : 'fixed leads'
  return { subject: nameOf(supply), words: `${watts}; ${family}.`, look: total === null, parts: [supply.part.id] }
}

/** The leads on modular sockets; on other outlets the pins are standard. */
function leadLines(supply: ResolvedPart, foreign: ReadonlySet<string>): AnswerLine[] {
  return supply.connectors.filter(isModular).flatMap((socket) =>
    socket.joints
      .filter(({ mating }) => mating.mates)
      .map((joint) => {
        const { part: lead } = otherEnd(joint, socket)
        return {
          subject: nameOf(lead),
          words: `${lead.model.name}, on ${connectorName(socket)}: ${originWords(lead, supply)}.`,
          look: foreign.has(lead.part.id),
          parts: [lead.part.id, supply.part.id],
        }
      }),
  )
}

const isModular = ({ type }: ResolvedConnector): boolean => type.id.startsWith('modular-')

function originWords({ part, model }: ResolvedPart, supply: ResolvedPart): string {
  const { pinTest } = part
  if (pinTest && pinTest.supply === supply.part.id && pinTest.supplyModel === supply.model.id)
    return `every pin measured on this supply by ${pinTest.by} on ${pinTest.on}`
  if (pinTest) return 'its pin test was made on another supply'
  if (model.pinoutFamily === undefined || supply.model.pinoutFamily === undefined)
    return 'nobody has stated that it belongs to this supply'
  return model.pinoutFamily === supply.model.pinoutFamily
    ? 'of the same pinout family'
    : `made for the family "${model.pinoutFamily}"`
}
