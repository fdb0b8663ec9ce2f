import type { ResolvedConnector, ResolvedPart } from '../../build/resolve.ts'
import { connectorSubject, partSubject } from '../../check/subjects.ts'
import { length, placeOf } from '../../check/words.ts'
import { reachOf } from '../../electrical/leadReach.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  connector: ResolvedConnector
  route_mm: number
  reach_mm: number
}

export const leadTooShort = defineRule<Facts>({
  meta: {
    id: 'lead-too-short',
    title: 'A lead shorter than its route',
    severities: ['fault'],
    finds: 'Leads, splitters and cables whose measured route in the case is longer than they are.',
    why: 'A lead that just does not reach is found out on power-on day, and a stretched one pulls its plug loose.',
    needs: ['route of the cable, where somebody measured it', 'length of its wires'],
    sources: [],
    commonPractice: true,
  },
  check({ build }) {
    return build.parts.flatMap((part) =>
      Object.entries(part.part.routes_mm ?? {}).flatMap(([id, route_mm]) => {
        const connector = part.connectorById.get(id)
        const reach_mm = connector ? reachTo(part, connector) : null
        if (!connector || reach_mm === null || route_mm <= reach_mm) return []
        return [
          {
            severity: 'fault' as const,
            subjects: [connectorSubject(connector), partSubject(part)],
            load: route_mm,
            limit: reach_mm,
            unit: 'mm' as const,
            facts: { connector, route_mm, reach_mm },
          },
        ]
      }),
    )
  },
  words({ facts: { connector, route_mm, reach_mm } }) {
    return {
      message: `The way to ${placeOf(connector)} is ${length(route_mm)}, and the cable reaches ${length(reach_mm)}: ${length(route_mm - reach_mm)} are missing.`,
      remedy: 'Use a longer one, or a route that is shorter; a little slack keeps the plug from being pulled.',
    }
  },
})

const reachTo = (part: ResolvedPart, connector: ResolvedConnector): number | null =>
  reachOf(part.model, connector.connector.id)
