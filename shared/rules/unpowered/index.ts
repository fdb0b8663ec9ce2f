import type { ResolvedBuild, ResolvedPart } from '../../build/resolve.ts'
import type { ModelKind } from '../../catalog/model.ts'
import type { Severity } from '../../check/severity.ts'
import { connectorSubject, partSubject } from '../../check/subjects.ts'
import { nameOf, placeOf, refsOf } from '../../check/words.ts'
import { isConsumer, powerNeighbours, railsNeeded, returnReaches } from '../../electrical/feeding.ts'
import type { PowerResult } from '../../electrical/result.ts'
import { defineRule, type RawFinding } from '../rule.ts'

type Facts =
  | { kind: 'unfed'; part: ResolvedPart; joined: readonly ResolvedPart[] }
  | { kind: 'ring'; ring: readonly ResolvedPart[] }
  | { kind: 'no-return'; part: ResolvedPart; place: string }
  | { kind: 'no-board'; cards: readonly ResolvedPart[] }

export const unpowered = defineRule<Facts>({
  meta: {
    id: 'unpowered',
    title: 'A device without power',
    severities: ['fault', 'caution', 'note'],
    finds:
      'Drives, cards, boards, backplanes and fans that no rail of any supply reaches or that have no way back to it, and leads that feed each other in a ring.',
    why: 'A device without power does nothing, and one whose return is missing looks for another way back, through a data cable or the case.',
    needs: ['joints', 'rails that each device takes'],
    sources: [],
    commonPractice: true,
  },
  check({ build, power }) {
    const bare = build.parts.filter((part) => isConsumer(part) && !isFed(part, power))
    const hasBoard = build.parts.some(({ model }) => model.kind === 'board')
    const cards = hasBoard ? [] : bare.filter(isCard)
    const found: RawFinding<Facts>[] = bare
      .filter((part) => !cards.includes(part))
      .map((part) => ({
        severity: severityOf(part),
        subjects: [partSubject(part)],
        facts: lackingReturn(part, power) ?? { kind: 'unfed', part, joined: joinedTo(part) },
      }))
    for (const ring of ringsOf(build))
      found.push({ severity: 'fault', subjects: ring.map(partSubject), detail: 'ring', facts: { kind: 'ring', ring } })
    if (cards.length > 0)
      found.push({ severity: 'note', subjects: cards.map(partSubject), facts: { kind: 'no-board', cards } })
    for (const problem of power.problems)
      if (problem.kind === 'no-return' && !bare.includes(problem.part))
        found.push({
          severity: 'fault',
          subjects: [connectorSubject(problem.connector), partSubject(problem.part)],
          detail: problem.line,
          facts: { kind: 'no-return', part: problem.part, place: placeOf(problem.connector) },
        })
    return found
  },
  words({ facts }) {
    switch (facts.kind) {
      case 'unfed':
        return facts.joined.length === 0
          ? {
              message: `${nameOf(facts.part)} has no power: none of its power connectors is joined.`,
              remedy: isCard(facts.part)
                ? 'Seat it in a slot of the board.'
                : 'Join it to an open outlet of a lead, splitter or backplane.',
            }
          : {
              message: `${nameOf(facts.part)} has no power: it is joined to ${refsOf(facts.joined)}, but no rail of a supply arrives there.`,
              remedy: `Join ${refsOf(facts.joined)} to a supply, directly or through leads that carry the rail.`,
            }
      case 'ring':
        return {
          message: `${refsOf(facts.ring)} feed each other in a ring, and nothing of a supply comes in.`,
          remedy: 'Open the ring at one inlet and join that inlet to an outlet that a supply feeds.',
        }
      case 'no-return':
        return {
          message: `A rail arrives at ${facts.place} of ${nameOf(facts.part)}, but no return leads back to a supply.`,
          remedy: 'Use a lead that carries the return with the rail.',
        }
      case 'no-board':
        return {
          message: `No board is on the plan, so the power of ${refsOf(facts.cards)} is not counted.`,
          remedy: 'Add the board and join the cards to its slots to have their load counted.',
        }
    }
  },
})

const isFed = (part: ResolvedPart, power: PowerResult): boolean =>
  part.connectors.some(
    (connector) => returnReaches(power, connector) && railsNeeded(part).some((rail) => power.reaches(connector, rail)),
  )

/** Splitters, adapters and leads whose only inlet hangs, over others of their kind, on their own outlet. */
function ringsOf(build: ResolvedBuild): ResolvedPart[][] {
  const rings: ResolvedPart[][] = []
  const done = new Set<ResolvedPart>()
  for (const start of build.parts) {
    const way: ResolvedPart[] = []
    let at: ResolvedPart | undefined = start
    while (at && !done.has(at) && !way.includes(at)) {
      way.push(at)
      at = feederOf(at)
    }
    if (at && way.includes(at)) rings.push(way.slice(way.indexOf(at)))
    for (const part of way) done.add(part)
  }
  return rings
}

const branching: ReadonlySet<ModelKind> = new Set<ModelKind>(['splitter', 'adapter', 'lead'])

/** The branching part whose outlet feeds this one's first connector. */
function feederOf({ model, connectors }: ResolvedPart): ResolvedPart | undefined {
  const inlet = connectors[0]
  if (!branching.has(model.kind) || !inlet) return undefined
  const outlet = powerNeighbours(inlet)[0]
  return outlet && branching.has(outlet.part.model.kind) && outlet !== outlet.part.connectors[0]
    ? outlet.part
    : undefined
}

/** A card takes its power from a slot only. */
const isCard = ({ connectors }: ResolvedPart): boolean => {
  const inlets = connectors.filter(({ type }) => type.power)
  return inlets.length > 0 && inlets.every(({ type }) => type.side === 'edge')
}

const joinedTo = (part: ResolvedPart): ResolvedPart[] => [
  ...new Set(part.connectors.flatMap(powerNeighbours).map((neighbour) => neighbour.part)),
]

function lackingReturn(part: ResolvedPart, power: PowerResult): Facts | null {
  const connector = part.connectors.find(
    (inlet) => !returnReaches(power, inlet) && railsNeeded(part).some((rail) => power.reaches(inlet, rail)),
  )
  return connector ? { kind: 'no-return', part, place: placeOf(connector) } : null
}

const severityOf = ({ model }: ResolvedPart): Severity => (model.kind === 'fan' ? 'caution' : 'fault')
