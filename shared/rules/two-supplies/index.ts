import type { ResolvedPart } from '../../build/resolve.ts'
import { partSubject } from '../../check/subjects.ts'
import { counted, refsOf } from '../../check/words.ts'
import { suppliesBehind, suppliesOf } from '../../electrical/feeding.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  supplies: { supply: ResolvedPart; drives: ResolvedPart[] }[]
  /** Drives that live on both: 12 V from one, 5 V from another. */
  split: ResolvedPart[]
}

export const twoSupplies = defineRule<Facts>({
  meta: {
    id: 'two-supplies',
    title: 'Two supplies in one machine',
    severities: ['caution', 'note'],
    finds: 'Machines with more than one supply: what each feeds, and drives that need both.',
    why: 'Both must start together and share their return, or a drive is live on its data side before its power comes; when either dies, its drives are gone.',
    needs: ['supplies', 'joints'],
    sources: [],
    commonPractice: true,
  },
  check({ build, power }) {
    const supplies = suppliesOf(build)
    if (supplies.length < 2) return []
    const feeders = new Map<ResolvedPart, Set<ResolvedPart>>()
    for (const device of power.devices)
      if (device.part.model.kind === 'drive') {
        const known = feeders.get(device.part) ?? new Set<ResolvedPart>()
        if (device.fedBy.length > 0)
          for (const supply of suppliesBehind(power, device.connector, device.rail)) known.add(supply)
        feeders.set(device.part, known)
      }
    const drivesOf = (supply: ResolvedPart) => [...feeders].filter(([, fed]) => fed.has(supply)).map(([drive]) => drive)
    const split = [...feeders].filter(([, fed]) => fed.size > 1).map(([drive]) => drive)
    return [
      {
        severity: split.length > 0 ? ('caution' as const) : ('note' as const),
        subjects: [...supplies, ...split].map(partSubject),
        facts: { supplies: supplies.map((supply) => ({ supply, drives: drivesOf(supply) })), split },
      },
    ]
  },
  words({ facts: { supplies, split } }) {
    const each = supplies.map(({ supply, drives }) =>
      drives.length > 0
        ? `${supply.part.ref} feeds ${refsOf(drives)} (${counted(drives.length, 'drive')} lost with it)`
        : `${supply.part.ref} feeds no drive`,
    )
    const both = split.length > 0 ? ` ${refsOf(split)} ${split.length === 1 ? 'needs' : 'need'} both at once.` : ''
    return {
      message: `The machine has ${counted(supplies.length, 'supply', 'supplies')}: ${each.join('; ')}.${both}`,
      remedy:
        'Let one switch on the other, join their returns with a wire of their own, and keep the rails of both apart everywhere.' +
        (split.length > 0 ? ' Feed every drive from one of them.' : ''),
    }
  },
})
