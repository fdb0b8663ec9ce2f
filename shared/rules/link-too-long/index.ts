import type { ResolvedPart } from '../../build/resolve.ts'
import { partSubject } from '../../check/subjects.ts'
import { length, listed, nameOf, refsOf } from '../../check/words.ts'
import type { DataResult, HopLane } from '../../datapath/result.ts'
import { defineRule, type RawFinding } from '../rule.ts'
import { lengthLimit, type LengthLimit } from './limits.ts'

interface Facts {
  cables: readonly ResolvedPart[]
  ends: ResolvedPart[]
  length_mm: number
  limit: LengthLimit
}

export const linkTooLong = defineRule<Facts>({
  meta: {
    id: 'link-too-long',
    title: 'Data link too long',
    severities: ['fault', 'caution'],
    finds: 'Cables of one data link that are together longer than the limit for their protocol and rate.',
    why: 'Every passive part of a link takes some of the signal. A link that is too long drops to a lower rate, collects errors, or stays dark.',
    needs: ['lanes from every controller', 'length of each cable', 'protocol and rate of the link'],
    sources: ['R38', 'R4', 'R5', 'R23'],
    disputed:
      'No standard states metres for internal SAS cables, only a budget of loss: 1 m is what is sold and supported. The limits for 12 Gb/s external cables and for NVMe cables are common practice too.',
  },
  check({ data }) {
    return [...longLinks(data).values()]
  },
  words({ facts: { cables, ends, length_mm, limit } }) {
    const names = listed(cables.map(nameOf))
    const measure =
      cables.length > 1
        ? `${names} together make ${length(length_mm)}`
        : `${names} ${cables[0]?.part.ref === names ? 'is' : 'measures'} ${length(length_mm)}${cables[0]?.part.ref === names ? ' long' : ''}`
    return {
      message: `${measure} on the way to ${refsOf(ends)}; ${limit.name} allows ${length(limit.length_mm)}.`,
      remedy: limit.isPractice
        ? 'Choose shorter cables, or watch the error counters of these drives after the first full read.'
        : 'Choose shorter cables, or move the controller or expander nearer to the drives.',
    }
  },
})

/** One finding for each set of cables that is too long under one limit. */
function longLinks(data: DataResult): Map<string, RawFinding<Facts>> {
  const found = new Map<string, RawFinding<Facts>>()
  for (const hop of data.hops)
    for (const lane of hop.lanes) {
      if (lane.length_mm === null || lane.length_mm === 0) continue
      const limit = lengthLimit(hop.to, lane)
      if (lane.length_mm <= limit.length_mm) continue
      const cables = lane.through.filter((part) => part.model.cable !== undefined)
      const key = `${cables.map((part) => part.index).join('.')} ${limit.id}`
      const known = found.get(key)
      if (known) addEnd(known, hop.to)
      else found.set(key, makeFinding(cables, hop.to, lane, limit))
    }
  return found
}

function addEnd(finding: RawFinding<Facts>, end: ResolvedPart): void {
  if (finding.facts.ends.includes(end)) return
  finding.facts.ends.push(end)
  finding.subjects.push(partSubject(end))
}

function makeFinding(
  cables: readonly ResolvedPart[],
  end: ResolvedPart,
  lane: HopLane,
  limit: LengthLimit,
): RawFinding<Facts> {
  const length_mm = lane.length_mm ?? 0
  return {
    severity: limit.isPractice ? 'caution' : 'fault',
    subjects: [...cables.map(partSubject), partSubject(end)],
    detail: limit.id,
    load: length_mm,
    limit: limit.length_mm,
    unit: 'mm',
    about: cables.some((part) => part.model.cable?.length_mm.origin === 'guess'),
    facts: { cables, ends: [end], length_mm, limit },
  }
}
