import type { ResolvedConnector, ResolvedPart } from '../../build/resolve.ts'
import { connectorSubject, partSubject } from '../../check/subjects.ts'
import { counted, listed, nameOf } from '../../check/words.ts'
import { rails } from '../../quantity/rails.ts'
import { isInlet } from '../../electrical/attach.ts'
import { backplaneInlets, powerNeighbours } from '../../electrical/feeding.ts'
import { lineIndex } from '../../electrical/lines.ts'
import type { PowerResult } from '../../electrical/result.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  backplane: ResolvedPart
  open: ResolvedConnector[]
  dead: ResolvedConnector[]
  fed: number
  drives: number
}

export const underfedBackplane = defineRule<Facts>({
  meta: {
    id: 'underfed-backplane',
    title: 'A backplane with inlets left open',
    severities: ['fault', 'caution'],
    finds: 'Backplanes with power inlets that are open or fed by nothing, while drives sit in them.',
    why: 'The inlets share the current of all bays: with one left open the others carry its part through plug and board, and makers ask for all of them to be used at once.',
    needs: ['power inlets of the backplane', 'joints'],
    sources: ['S62b'],
  },
  check({ build, power }) {
    return build.parts.flatMap((backplane) => {
      if (backplane.model.kind !== 'backplane') return []
      const inlets = backplaneInlets(backplane)
      const dead = inlets.filter((inlet) => !isFed(power, inlet))
      const drives = backplane.connectors.filter(
        ({ connector, joints }) => connector.bay !== undefined && joints.length > 0,
      ).length
      if (dead.length === 0 || drives === 0) return []
      const fed = inlets.length - dead.length
      return [
        {
          severity: fed === 0 ? ('fault' as const) : ('caution' as const),
          subjects: [partSubject(backplane), ...dead.map(connectorSubject)],
          facts: { backplane, open: dead.filter((inlet) => powerNeighbours(inlet).length === 0), dead, fed, drives },
        },
      ]
    })
  },
  words({ facts }) {
    const { backplane, open, dead, fed, drives } = facts
    const labels = listed(dead.map(({ connector }) => connector.label))
    const state = open.length === dead.length ? 'open' : 'joined to nothing that a supply feeds'
    const rest =
      fed === 0
        ? `None of its inlets is fed, for ${counted(drives, 'drive')}.`
        : `${counted(fed, 'inlet')} ${fed === 1 ? 'carries' : 'carry'} the current of ${counted(drives, 'drive')}.`
    return {
      message: `${nameOf(backplane)}: ${labels} ${dead.length === 1 ? 'is' : 'are'} ${state}. ${rest}`,
      remedy: `Join ${labels} to outlets of leads, spread over as many leads as there are.`,
    }
  },
})

/** A joint of its own brings some rail here: a plane inside the backplane does not count. */
const isFed = ({ network }: PowerResult, inlet: ResolvedConnector): boolean =>
  rails.some((rail) => inlet.contacts[rail] > 0 && isInlet(network.byLine[lineIndex[rail]]!, inlet))
