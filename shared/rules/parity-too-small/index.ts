import type { ResolvedPart } from '../../build/resolve.ts'
import { partSubject } from '../../check/subjects.ts'
import { amount, nameOf } from '../../check/words.ts'
import { byRef, highFigure, isShaky, lowFigure } from '../../datapath/parts.ts'
import { figureOf } from '../../electrical/figures.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  parity: ResolvedPart
  parity_TB: number
  largest: ResolvedPart
  largest_TB: number
}

export const parityTooSmall = defineRule<Facts>({
  meta: {
    id: 'parity-too-small',
    title: 'Redundancy drive too small',
    severities: ['fault'],
    finds: 'A redundancy drive smaller than the largest data drive that it protects.',
    why: 'What lies past the end of the redundancy drive cannot be rebuilt: array software refuses such a set.',
    needs: ['role and capacity of each drive'],
    sources: [],
    commonPractice: true,
  },
  check({ build }) {
    const largest = largestData([...build.parts].sort(byRef))
    if (!largest) return []
    return build.parts.flatMap((parity) => {
      const capacity = parity.model.drive?.capacity_TB
      const parity_TB = lowFigure(capacity)
      if (parity.part.role !== 'parity' || !capacity || parity_TB === null || parity_TB >= largest.size_TB) return []
      const largestCapacity = largest.drive.model.drive?.capacity_TB
      return [
        {
          severity: 'fault' as const,
          subjects: [partSubject(parity), partSubject(largest.drive)],
          load: largest.size_TB,
          limit: parity_TB,
          unit: 'TB' as const,
          decidedBy: [figureOf(capacity, `capacity of ${parity.part.ref}`, 'TB')],
          about: isShaky(capacity) || isShaky(largestCapacity),
          facts: { parity, parity_TB, largest: largest.drive, largest_TB: largest.size_TB },
        },
      ]
    })
  },
  words({ facts: { parity, parity_TB, largest, largest_TB } }) {
    return {
      message: `${nameOf(parity)} protects the array with ${amount(parity_TB, 'TB')}, but ${nameOf(largest)} holds ${amount(largest_TB, 'TB')}.`,
      remedy: 'Give the redundancy role to a drive at least as large as the largest data drive.',
    }
  },
})

function largestData(parts: readonly ResolvedPart[]): { drive: ResolvedPart; size_TB: number } | null {
  let largest: { drive: ResolvedPart; size_TB: number } | null = null
  for (const drive of parts) {
    const size_TB = highFigure(drive.model.drive?.capacity_TB)
    if (drive.part.role === 'data' && size_TB !== null && size_TB > (largest?.size_TB ?? 0))
      largest = { drive, size_TB }
  }
  return largest
}
