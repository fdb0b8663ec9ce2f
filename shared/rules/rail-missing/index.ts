import type { ResolvedConnector, ResolvedPart } from '../../build/resolve.ts'
import { connectorSubject, partSubject } from '../../check/subjects.ts'
import { listed, nameOf, placeOf } from '../../check/words.ts'
import type { Rail } from '../../quantity/rails.ts'
import type { Draw } from '../../electrical/attach.ts'
import { powerNeighbours, railsNeeded, returnReaches } from '../../electrical/feeding.ts'
import { lineName } from '../../electrical/lines.ts'
import type { PowerResult } from '../../electrical/result.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  part: ResolvedPart
  /** Where the model draws the missing rail. */
  at: ResolvedConnector
  missing: Rail[]
  arriving: Rail[]
  /** Nothing that carries power is joined there. */
  open: boolean
}

export const railMissing = defineRule<Facts>({
  meta: {
    id: 'rail-missing',
    title: 'A rail does not arrive',
    severities: ['fault'],
    finds:
      'Devices that get some rail but not all that they use: 12 V without 5 V, a board without its processor lead.',
    why: 'A 3.5 in drive without 12 V answers and never spins; a drive without 5 V is dead although its lead is live.',
    needs: ['rails that each device takes', 'rails that each connector and lead carries'],
    sources: ['S16', 'S24'],
  },
  check({ build, power }) {
    const drawsOf = byPart(power.draws)
    return build.parts.flatMap((part) => {
      const needed = railsNeeded(part)
      if (part.model.supply || needed.length === 0) return []
      const arriving = needed.filter((rail) => arrives(power, drawsOf.get(part) ?? [], rail))
      const missing = needed.filter((rail) => !arriving.includes(rail))
      if (arriving.length === 0 || missing.length === 0) return []
      const at = drawsOf.get(part)?.find((draw) => draw.rail === missing[0])?.connector ?? part.connectors[0]!
      const open = powerNeighbours(at).length === 0
      return [
        {
          severity: 'fault' as const,
          subjects: [partSubject(part), connectorSubject(at)],
          detail: missing.join('+'),
          facts: { part, at, missing, arriving, open },
        },
      ]
    })
  },
  words({ facts }) {
    const { part, at, missing, arriving, open } = facts
    const names = (lines: readonly Rail[]) => listed(lines.map((line) => lineName[line]))
    const has = `${nameOf(part)} gets ${names(arriving)}, but not ${names(missing)}`
    if (open)
      return {
        message: `${has}, which it takes at ${placeOf(at)}: nothing is joined there.`,
        remedy: `Join ${placeOf(at)} to a lead that carries ${names(missing)}.`,
      }
    return {
      message: `${has}: what feeds ${placeOf(at)} does not carry it.`,
      remedy: `Feed it through a lead whose connectors carry ${names(missing)} all the way from the supply.`,
    }
  },
})

/** The rail arrives with its return where the part draws it. */
const arrives = (power: PowerResult, draws: readonly Draw[], rail: Rail): boolean =>
  draws.some(
    (draw) => draw.rail === rail && power.reaches(draw.connector, rail) && returnReaches(power, draw.connector),
  )

function byPart(draws: readonly Draw[]): ReadonlyMap<ResolvedPart, readonly Draw[]> {
  const grouped = new Map<ResolvedPart, Draw[]>()
  for (const draw of draws) {
    const others = grouped.get(draw.part)
    if (others) others.push(draw)
    else grouped.set(draw.part, [draw])
  }
  return grouped
}
