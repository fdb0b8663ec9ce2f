import type { ResolvedConnector, ResolvedPart } from '../../build/resolve.ts'
import { connectorSubject, partSubject } from '../../check/subjects.ts'
import { nameOf, placeOf, refsOf } from '../../check/words.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  cable: ResolvedPart
  enteredAt: ResolvedConnector
  drives: readonly ResolvedPart[]
}

export const breakoutReversed = defineRule<Facts>({
  meta: {
    id: 'breakout-reversed',
    title: 'Breakout for the other direction',
    severities: ['fault'],
    finds: 'A forward breakout where a reverse one is needed, or the other way round.',
    why: 'Both kinds look alike and fit alike, yet they swap transmit and receive: with the wrong one all its links stay dark, without any error message.',
    needs: ['lanes from every controller', 'direction of each cable'],
    sources: ['R2', 'R7'],
    commonPractice: true,
  },
  check({ data }) {
    const byCable = new Map(data.reversals.map(({ cable, enteredAt }) => [cable, enteredAt] as const).reverse())
    return [...byCable].map(([cable, enteredAt]) => {
      const drives = [...new Set(data.paths.filter((path) => path.through.includes(cable)).map((path) => path.drive))]
      return {
        severity: 'fault',
        subjects: [partSubject(cable), connectorSubject(enteredAt), ...drives.map(partSubject)],
        facts: { cable, enteredAt, drives },
      }
    })
  },
  words({ facts: { cable, enteredAt, drives } }) {
    const isForward = cable.model.cable?.direction === 'forward'
    const joint = enteredAt.joints.find(({ mating }) => mating.lanes > 0)
    const other = joint && (joint.a === enteredAt ? joint.b : joint.a)
    const seat = other ? `${enteredAt.connector.label} sits at ${placeOf(other)}` : enteredAt.connector.label
    const behind = drives.length > 0 ? ` ${refsOf(drives)} will not be seen.` : ''
    return isForward
      ? {
          message: `${nameOf(cable)} is a forward breakout (multilane end at the controller), but its ${seat} on the controller’s side.${behind}`,
          remedy: 'Use a reverse breakout here (legs at the host ports, multilane end at the backplane).',
        }
      : {
          message: `${nameOf(cable)} is a reverse breakout (legs at host ports), but its multilane end ${seat} on the controller’s side.${behind}`,
          remedy: 'Use a forward breakout here (multilane end at the controller, legs at the drives).',
        }
  },
})
