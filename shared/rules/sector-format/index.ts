import type { ResolvedPart } from '../../build/resolve.ts'
import { partSubject } from '../../check/subjects.ts'
import { counted, nameOf, refsOf } from '../../check/words.ts'
import { byRef } from '../../datapath/parts.ts'
import type { DataResult } from '../../datapath/result.ts'
import { defineRule } from '../rule.ts'

type Trouble =
  | { kind: 'odd'; logical_B: number }
  | { kind: 'not passed'; logical_B: number; controller: ResolvedPart }
  | { kind: 'protection' }

interface Facts {
  trouble: Trouble
  drives: ResolvedPart[]
}

export const sectorFormat = defineRule<Facts>({
  meta: {
    id: 'sector-format',
    title: 'Sectors that the system will not take',
    severities: ['fault', 'caution'],
    finds:
      'Drives with 520- or 528-byte sectors, sectors that their controller does not hand on, or sectors with protection information.',
    why: 'Drives from storage arrays are often formatted with sectors of 520 or 528 bytes: the system then shows a drive of size zero. They are sound, but need a low-level format that takes hours and erases them.',
    needs: ['logical and physical sector size of each drive', 'sector sizes that controllers hand on'],
    sources: ['R70', 'R71', 'R72'],
  },
  check({ build, data }) {
    return [...groups([...build.parts].sort(byRef), data).values()].map((facts) => ({
      severity: facts.trouble.kind === 'protection' ? ('caution' as const) : ('fault' as const),
      subjects: facts.drives.map(partSubject),
      detail: facts.trouble.kind,
      facts,
    }))
  },
  words({ facts: { trouble, drives } }) {
    const who = `${refsOf(drives)} ${drives.length === 1 ? 'has' : 'have'}`
    switch (trouble.kind) {
      case 'odd':
        return {
          message: `${who} sectors of ${trouble.logical_B} bytes, which the system does not take: ${counted(drives.length, 'drive')} will show with size zero.`,
          remedy:
            'Format to 512 or 4096 bytes first (sg_format --format --size=512). It erases the drive, takes hours and must not be interrupted.',
        }
      case 'not passed':
        return {
          message: `${who} sectors of ${trouble.logical_B} bytes, which ${nameOf(trouble.controller)} does not hand on.`,
          remedy: 'Use a controller that takes this sector size, or drives with sectors of 512 bytes.',
        }
      case 'protection':
        return {
          message: `${who} 8 bytes of protection information on each sector. Some controllers refuse such drives.`,
          remedy:
            'Try one drive on this controller first; sg_format --format --fmtpinfo=0 takes the protection away and erases the drive.',
        }
    }
  },
})

function groups(parts: readonly ResolvedPart[], data: DataResult): Map<string, Facts> {
  const found = new Map<string, Facts>()
  for (const drive of parts) {
    const trouble = troubleOf(drive, data)
    if (!trouble) continue
    const key = `${trouble.kind} ${'logical_B' in trouble ? trouble.logical_B : ''} ${'controller' in trouble ? trouble.controller.index : ''}`
    const facts = found.get(key)
    if (facts) facts.drives.push(drive)
    else found.set(key, { trouble, drives: [drive] })
  }
  return found
}

function troubleOf(drive: ResolvedPart, data: DataResult): Trouble | null {
  const sectors = drive.model.drive?.sectors
  if (!sectors) return null
  const { logical_B, physical_B } = sectors
  if (logical_B !== 512 && logical_B !== 4096) return { kind: 'odd', logical_B }
  const deaf = data
    .pathsOf(drive)
    .find(({ fault, controller: { controller } }) => !fault && controller.sectors_B?.includes(logical_B) === false)
  if (deaf) return { kind: 'not passed', logical_B, controller: deaf.controller.part }
  return physical_B % 512 === 8 || physical_B % 4096 === 8 ? { kind: 'protection' } : null
}
