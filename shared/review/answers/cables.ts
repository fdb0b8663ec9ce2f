import { connectorName } from '../../build/edits/words.ts'
import type { ResolvedPart } from '../../build/resolve.ts'
import { counted, length, listed, nameOf, refsOf } from '../../check/words.ts'
import { byRef } from '../../datapath/parts.ts'
import type { LanePath } from '../../datapath/result.ts'
import type { Answer, AnswerInput, AnswerLine } from '../answer.ts'

const directionWords = {
  forward: 'forward: one port to several drives',
  reverse: 'reverse: several ports to one backplane',
  symmetric: 'the same both ways',
} as const

/** Which data cable runs from where to where, which way it is wired, and how long it is. */
export function answerCables({ analysis: { build, data } }: AnswerInput): Answer {
  const cables = build.parts.filter(({ model }) => model.cable !== undefined).sort(byRef)
  const reversed = new Set(data.reversals.map(({ cable }) => cable))
  const lines = cables.map((cable) =>
    toLine(
      cable,
      data.paths.filter(({ through }) => through.includes(cable)),
      reversed,
    ),
  )
  const wrong = cables.filter((cable) => reversed.has(cable))
  const lost = lines.filter(({ look }) => look).length - wrong.length
  const verdict = [
    wrong.length > 0 ? `${refsOf(wrong)} ${wrong.length === 1 ? 'is' : 'are'} wired for the other direction` : '',
    lost > 0 ? `${counted(lost, 'cable')} ${lost === 1 ? 'leads' : 'lead'} no working data` : '',
  ].filter(Boolean)
  return {
    id: 'cables',
    question: 'Which data cables, in which direction?',
    short:
      cables.length === 0
        ? 'No data cable is drawn.'
        : `${counted(cables.length, 'data cable')}; ${verdict.length > 0 ? listed(verdict) : 'every one runs the way it is wired for'}.`,
    lines,
  }
}

function toLine(cable: ResolvedPart, paths: readonly LanePath[], reversed: ReadonlySet<ResolvedPart>): AnswerLine {
  const { direction, length_mm } = cable.model.cable ?? { direction: 'symmetric', length_mm: { value: null } }
  const from = [...new Set(paths.map((path) => connectorName(path.port)))]
  const drives = [...new Set(paths.map(({ drive }) => drive))]
  const way = paths.length === 0 ? 'carries no data' : `${listed(from)} to ${refsOf(drives)}`
  const size = length_mm.value === null ? 'length unknown' : length(length_mm.value)
  const faulty = paths.some(({ fault }) => fault !== null)
  return {
    subject: nameOf(cable),
    words: `${way}; ${directionWords[direction]}; ${size}${reversed.has(cable) ? '; here it runs the other way' : ''}.`,
    look: reversed.has(cable) || paths.length === 0 || faulty,
    parts: [cable.part.id, ...drives.map(({ part }) => part.id)],
  }
}
