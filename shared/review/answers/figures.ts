import type { ResolvedPart } from '../../build/resolve.ts'
import { listFigures } from '../../catalog/figureList.ts'
import { counted, listed, nameOf } from '../../check/words.ts'
import { byRef } from '../../datapath/parts.ts'
import { originKinds, type OriginKind, type Quantity } from '../../quantity/quantity.ts'
import type { Answer, AnswerInput, AnswerLine } from '../answer.ts'

const originWords: Readonly<Record<OriginKind, string>> = {
  standard: 'from a standard',
  maker: 'from a maker’s document',
  measured: 'measured',
  'common practice': 'common practice',
  'class default': 'class figures',
  guess: 'guesses',
}

/** What is measured, what is stated, what is assumed; and which verdicts a better figure could turn. */
export function answerFigures({ analysis: { build }, result }: AnswerInput): Answer {
  const figures = build.parts.flatMap(({ model }) =>
    listFigures(model).flatMap((group) => group.figures.map(({ quantity }) => quantity)),
  )
  const unknown = figures.filter(({ value }) => value === null).length
  const measured = figures.filter(({ origin, value }) => origin === 'measured' && value !== null).length
  const hanging = result.findings.filter(({ rule }) => rule === 'unproven')
  return {
    id: 'figures',
    question: 'What is measured, and what is assumed?',
    short:
      figures.length === 0
        ? 'No part carries figures yet.'
        : `${measured === 0 ? `Nothing is measured yet: all ${figures.length} figures are` : `${measured} of ${figures.length} figures measured, the others`} stated or assumed. ${hanging.length === 0 ? 'No verdict would turn within the stated ranges.' : `${counted(hanging.length, 'better figure')} could turn a verdict.`}`,
    lines: [
      originLine(figures, unknown),
      ...[...build.parts].sort(byRef).flatMap(ownLine),
      ...[...build.parts].sort(byRef).flatMap(pinTestLine),
      ...hanging.map(({ message, remedy, subjects }): AnswerLine => ({
        subject: 'Could turn',
        words: `${message} ${remedy}`,
        look: true,
        parts: subjects.flatMap(({ part }) => part ?? []),
      })),
    ],
  }
}

function originLine(figures: readonly Quantity[], unknown: number): AnswerLine {
  const known = figures.filter(({ value }) => value !== null)
  const counts = originKinds.flatMap((origin) => {
    const count = known.filter((figure) => figure.origin === origin).length
    return count === 0 ? [] : [`${count} ${originWords[origin]}`]
  })
  const words = [...counts, ...(unknown > 0 ? [`${unknown} unknown`] : [])]
  return { subject: 'All figures', words: `${listed(words, 8)}.`, look: unknown > 0, parts: [] }
}

/** Figures that somebody entered for this very part. */
function ownLine(part: ResolvedPart): AnswerLine[] {
  const own = Object.entries(part.part.overrides ?? {})
  if (own.length === 0) return []
  const labels = new Map(listFigures(part.model).flatMap(({ figures }) => figures.map((one) => [one.path, one])))
  const words = own.map(([path, { value, origin, by }]) => {
    const { label = path, unit = '' } = labels.get(path) ?? {}
    return `${label} ${value ?? 'unknown'}${unit === '' ? '' : ` ${unit}`} (${origin}${by ? `, ${by}` : ''})`
  })
  const guessed = own.some(([, { value, origin }]) => value === null || origin === 'guess')
  return [{ subject: nameOf(part), words: `${listed(words)}.`, look: guessed, parts: [part.part.id] }]
}

function pinTestLine(part: ResolvedPart): AnswerLine[] {
  const { pinTest } = part.part
  if (!pinTest) return []
  return [
    {
      subject: nameOf(part),
      words: `every pin measured by ${pinTest.by} on ${pinTest.on}.`,
      look: false,
      parts: [part.part.id],
    },
  ]
}
