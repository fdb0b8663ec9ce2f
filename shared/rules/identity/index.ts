import type { ResolvedPart } from '../../build/resolve.ts'
import { buildSubject, partSubject } from '../../check/subjects.ts'
import { counted, refsOf } from '../../check/words.ts'
import { byRef } from '../../datapath/parts.ts'
import { defineRule, type RawFinding } from '../rule.ts'

type Facts =
  | { kind: 'missing'; drives: readonly ResolvedPart[]; all: number }
  | { kind: 'twice'; serial: string; parts: readonly ResolvedPart[] }

export const identity = defineRule<Facts>({
  meta: {
    id: 'identity',
    title: 'Serial missing or twice',
    severities: ['fault', 'note'],
    finds: 'Drives without a serial number, and parts that carry the same one.',
    why: 'The system names a failed drive by its serial: only with it on the plan does the right drive get pulled out.',
    needs: ['serial of each part'],
    sources: ['R74'],
  },
  check({ build }) {
    const parts = [...build.parts].sort(byRef)
    const drives = parts.filter((part) => part.model.drive)
    const missing = drives.filter((drive) => serialOf(drive) === '')
    return [...sameSerial(parts), ...(missing.length > 0 ? [missingSerial(missing, drives.length)] : [])]
  },
  words({ facts }) {
    if (facts.kind === 'twice')
      return {
        message: `${refsOf(facts.parts)} carry the same serial, ${facts.serial}.`,
        remedy: 'Read the labels again and correct the one that is wrong.',
      }
    const { drives, all } = facts
    return {
      message:
        drives.length === all && all > 1
          ? `None of the ${counted(all, 'drive')} has a serial on the plan.`
          : `${refsOf(drives)} ${drives.length === 1 ? 'has' : 'have'} no serial on the plan.`,
      remedy: 'Take the serials over from the labels, or paste what smartctl or lsblk says.',
    }
  },
})

const serialOf = (part: ResolvedPart): string => (part.part.serial ?? '').trim().toUpperCase()

function missingSerial(drives: readonly ResolvedPart[], all: number): RawFinding<Facts> {
  return {
    severity: 'note',
    subjects: [buildSubject, ...drives.map(partSubject)],
    detail: 'missing',
    facts: { kind: 'missing', drives, all },
  }
}

/** One model and serial together name one thing; drives are held against all drives. */
function sameSerial(parts: readonly ResolvedPart[]): RawFinding<Facts>[] {
  const bySerial = new Map<string, ResolvedPart[]>()
  for (const part of parts) {
    const serial = serialOf(part)
    if (serial === '') continue
    const key = `${part.model.kind} ${serial}`
    const others = bySerial.get(key)
    if (others) others.push(part)
    else bySerial.set(key, [part])
  }
  return [...bySerial.values()].flatMap((same): RawFinding<Facts>[] =>
    same.length < 2
      ? []
      : [
          {
            severity: 'fault',
            subjects: same.map(partSubject),
            detail: 'twice',
            facts: { kind: 'twice', serial: (same[0]?.part.serial ?? '').trim(), parts: same },
          },
        ],
  )
}
