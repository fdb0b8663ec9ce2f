import type { ResolvedBuild, ResolvedConnector, ResolvedPart } from '../../build/resolve.ts'
import { connectorSubject, partSubject } from '../../check/subjects.ts'
import { nameOf, refsOf } from '../../check/words.ts'
import { byRef } from '../../datapath/parts.ts'
import { defineRule, type RawFinding } from '../rule.ts'

type Facts =
  | { kind: 'shared'; case: ResolvedPart; slot: number; drives: readonly ResolvedPart[] }
  | { kind: 'elsewhere'; drive: ResolvedPart; slot: number; backplane: ResolvedPart; served: number }
  | { kind: 'backplanes'; case: ResolvedPart; slot: number; backplanes: readonly ResolvedPart[] }

export const bayConflict = defineRule<Facts>({
  meta: {
    id: 'bay-conflict',
    title: 'Two things in one bay',
    severities: ['fault'],
    finds:
      'Two drives in one bay, two backplanes behind one bay, or a drive that is in one bay and plugged in at another.',
    why: 'The plan is what the fitter goes by: a bay holds one drive, and a backplane receptacle serves the one bay before it.',
    needs: ['bay of each drive and backplane', 'bay that each receptacle of a backplane serves'],
    sources: [],
    commonPractice: true,
  },
  check({ build }) {
    return [...sharedBays(build), ...pluggedElsewhere(build), ...sharedBackplaneBays(build)]
  },
  words({ facts }) {
    switch (facts.kind) {
      case 'shared':
        return {
          message: `${refsOf(facts.drives)} share bay ${facts.slot} of ${nameOf(facts.case)}.`,
          remedy: 'Move all but one of them to free bays.',
        }
      case 'elsewhere':
        return {
          message: `${nameOf(facts.drive)} is in bay ${facts.slot}, but plugged into the receptacle of ${nameOf(facts.backplane)} that serves bay ${facts.served}.`,
          remedy: `Move the drive to bay ${facts.served}, or join it to the receptacle of bay ${facts.slot}.`,
        }
      case 'backplanes':
        return {
          message: `${refsOf(facts.backplanes)} serve the same bay, ${facts.slot} of ${nameOf(facts.case)}.`,
          remedy: 'State for each backplane the first bay that it serves, so that none overlap.',
        }
    }
  },
})

function groupByBay<T extends { key: string }>(items: readonly T[]): T[][] {
  const groups = new Map<string, T[]>()
  for (const item of items) {
    const group = groups.get(item.key)
    if (group) group.push(item)
    else groups.set(item.key, [item])
  }
  return [...groups.values()].filter((group) => group.length > 1)
}

function sharedBays(build: ResolvedBuild): RawFinding<Facts>[] {
  const seated = build.parts.flatMap((drive) => {
    const { bay } = drive.part
    const holder = bay && build.partById.get(bay.case)
    return drive.model.drive && bay && holder
      ? [{ key: `${holder.index}/${bay.slot}`, drive, holder, slot: bay.slot }]
      : []
  })
  return groupByBay(seated).flatMap((group) => {
    const [first] = group
    if (!first) return []
    const drives = group.map((item) => item.drive)
    return [
      {
        severity: 'fault',
        subjects: [partSubject(first.holder), ...drives.map(partSubject)],
        detail: `bay ${first.slot}`,
        facts: { kind: 'shared', case: first.holder, slot: first.slot, drives },
      },
    ]
  })
}

/** The bay that a receptacle of a placed backplane serves. */
function servedBay({ part, connector }: ResolvedConnector): { case: string; slot: number } | undefined {
  const { bay } = part.part
  return bay && connector.bay !== undefined ? { case: bay.case, slot: bay.slot + connector.bay - 1 } : undefined
}

function pluggedElsewhere(build: ResolvedBuild): RawFinding<Facts>[] {
  return build.joints.flatMap(({ a, b, mating }): RawFinding<Facts>[] => {
    const [plug, receptacle] = a.part.model.drive ? [a, b] : [b, a]
    const drive = plug.part
    const served = servedBay(receptacle)
    const { bay } = drive.part
    if (!mating.mates || !drive.model.drive || !bay || !served) return []
    if (bay.case === served.case && bay.slot === served.slot) return []
    return [
      {
        severity: 'fault',
        subjects: [partSubject(drive), connectorSubject(receptacle)],
        detail: 'elsewhere',
        facts: { kind: 'elsewhere', drive, slot: bay.slot, backplane: receptacle.part, served: served.slot },
      },
    ]
  })
}

function sharedBackplaneBays(build: ResolvedBuild): RawFinding<Facts>[] {
  const served = [...build.parts].sort(byRef).flatMap((backplane) => {
    const holder = backplane.part.bay && build.partById.get(backplane.part.bay.case)
    if (backplane.model.kind !== 'backplane' || !holder) return []
    return backplane.connectors.flatMap((connector) => {
      const bay = servedBay(connector)
      return bay ? [{ key: `${holder.index}/${bay.slot}`, backplane, holder, slot: bay.slot }] : []
    })
  })
  const reported = new Set<string>()
  return groupByBay(served).flatMap((group): RawFinding<Facts>[] => {
    const [first] = group
    const backplanes = [...new Set(group.map((item) => item.backplane))]
    const pair = backplanes.map((part) => part.index).join('.')
    if (!first || backplanes.length < 2 || reported.has(pair)) return []
    reported.add(pair)
    return [
      {
        severity: 'fault',
        subjects: [...backplanes.map(partSubject), partSubject(first.holder)],
        detail: 'backplanes',
        facts: { kind: 'backplanes', case: first.holder, slot: first.slot, backplanes },
      },
    ]
  })
}
