import { bayRange } from '../../build/edits/words.ts'
import type { ResolvedPart } from '../../build/resolve.ts'
import { counted, listed, refsOf } from '../../check/words.ts'
import { byRef } from '../../datapath/parts.ts'
import { groupBy } from '../../layout/groupBy.ts'
import { driveWords } from '../../paper/words.ts'
import type { Answer, AnswerInput, AnswerLine } from '../answer.ts'

/** Which drives, by which interface, in which bays, for what; and whether each is known by its serial. */
export function answerDrives({ analysis: { build } }: AnswerInput): Answer {
  const drives = build.parts.filter(({ model }) => model.kind === 'drive').sort(byRef)
  const groups = [...groupBy(drives, ({ model }) => model.id).values()]
  const kinds = groups.map((alike) => `${alike.length} of ${driveWords((alike[0] as ResolvedPart).model)}`)
  const unnamed = drives.filter(({ part }) => !part.serial)
  return {
    id: 'drives',
    question: 'Which drives, by which interface?',
    short:
      drives.length === 0
        ? 'No drive is drawn.'
        : `${counted(drives.length, 'drive')}: ${listed(kinds)}. ${unnamed.length === 0 ? 'Every serial is known.' : `${counted(unnamed.length, 'serial')} not known.`}`,
    lines: groups.flatMap((alike) => [...groupBy(alike, ({ part }) => part.role ?? '').values()].map(toLine)),
  }
}

function toLine(alike: readonly ResolvedPart[]): AnswerLine {
  const { model, part } = alike[0] as ResolvedPart
  const bays = alike.flatMap((drive) => drive.part.bay?.slot ?? [])
  const loose = alike.length - bays.length
  const { ports = 1, sectors } = model.drive ?? {}
  const words = [
    model.name,
    ports > 1 ? `${ports} ports` : '',
    sectors && sectors.logical_B !== 512 ? `sectors of ${sectors.logical_B} bytes` : '',
    bays.length > 0 ? bayRange(bays) : '',
    loose > 0 ? (bays.length > 0 ? `${loose} in no bay` : 'in no bay') : '',
    part.role ? `role ${part.role}` : 'no role stated',
  ]
  return {
    subject: refsOf(alike),
    words: `${words.filter(Boolean).join('; ')}.`,
    look: loose > 0,
    parts: alike.map((drive) => drive.part.id),
  }
}
