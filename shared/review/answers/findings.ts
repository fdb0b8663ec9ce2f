import type { Finding } from '../../check/result.ts'
import { counted, listed } from '../../check/words.ts'
import { severities, type Severity } from '../../check/severity.ts'
import type { Answer, AnswerInput, AnswerLine } from '../answer.ts'

const plural: Readonly<Record<Severity, string>> = {
  danger: 'dangers',
  fault: 'faults',
  caution: 'cautions',
  note: 'notes',
}

/** What the checker has to say: open findings, and those that somebody accepted with a reason. Notes are counted. */
export function answerFindings({ result }: AnswerInput): Answer {
  const open = result.findings.filter(({ accepted }) => !accepted)
  const accepted = result.findings.filter((finding) => finding.accepted)
  const counts = severities.flatMap((severity) => {
    const count = open.filter((finding) => finding.severity === severity).length
    return count === 0 ? [] : [counted(count, severity, plural[severity])]
  })
  return {
    id: 'findings',
    question: 'What does the checker say?',
    short: `${counts.length === 0 ? 'Nothing open: all is within the stated limits' : `Open: ${listed(counts)}`}. ${accepted.length === 0 ? 'Nothing is accepted.' : `${counted(accepted.length, 'finding')} accepted with a reason.`}`,
    lines: [...open.filter(({ severity }) => severity !== 'note').map(openLine), ...accepted.map(acceptedLine)],
  }
}

const partsOf = ({ subjects }: Finding): string[] => subjects.flatMap(({ part }) => part ?? [])

const openLine = (finding: Finding): AnswerLine => ({
  subject: finding.severity.charAt(0).toUpperCase() + finding.severity.slice(1),
  words: `${finding.about ? 'About: ' : ''}${finding.message}`,
  look: finding.severity !== 'caution',
  parts: partsOf(finding),
})

const acceptedLine = (finding: Finding): AnswerLine => ({
  subject: 'Accepted',
  words: `${finding.message} Reason: ${finding.accepted?.reason ?? ''} (${finding.accepted?.by || 'somebody'}, ${finding.accepted?.on.slice(0, 10) ?? ''})`,
  look: false,
  parts: partsOf(finding),
})
