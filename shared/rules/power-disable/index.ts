import type { ResolvedConnector, ResolvedPart } from '../../build/resolve.ts'
import { connectorSubject, partSubject } from '../../check/subjects.ts'
import { nameOf, placeOf } from '../../check/words.ts'
import { powerNeighbours } from '../../electrical/feeding.ts'
import { defineRule, type RawFinding } from '../rule.ts'

interface Facts {
  drive: ResolvedPart
  outlet: ResolvedConnector
  known: boolean
}

export const powerDisable = defineRule<Facts>({
  meta: {
    id: 'power-disable',
    title: '3.3 V tells a drive to stay off',
    severities: ['fault', 'note'],
    finds: 'Drives that obey contact 3 on an outlet or receptacle that puts 3.3 V there.',
    why: 'On newer drives contact 3 is a switch: 3.3 V on it holds the drive in reset. The drive is good, it just never starts.',
    needs: ['whether the drive obeys contact 3', 'whether the outlet feeds contact 3', 'whether 3.3 V arrives there'],
    sources: ['S36', 'S37'],
  },
  check({ build, power }) {
    return build.parts.flatMap((drive): RawFinding<Facts>[] => {
      const obeys = drive.model.drive?.powerDisable ?? 'no'
      if (obeys === 'no') return []
      const outlet = drive.connectors
        .flatMap(powerNeighbours)
        .find(
          (feeding) =>
            feeding.type.power?.hasPowerDisableContact === true &&
            feeding.connector.contact3 !== 'open' &&
            feeding.contacts['3.3V'] > 0 &&
            power.reaches(feeding, '3.3V'),
        )
      if (!outlet) return []
      return [
        {
          severity: obeys === 'yes' ? 'fault' : 'note',
          subjects: [partSubject(drive), connectorSubject(outlet)],
          facts: { drive, outlet, known: obeys === 'yes' },
        },
      ]
    })
  },
  words({ facts: { drive, outlet, known } }) {
    const cure = 'an outlet with contact 3 open, or a lead without 3.3 V'
    return known
      ? {
          message: `${nameOf(drive)} stays off while contact 3 has 3.3 V, and ${placeOf(outlet)} puts it there.`,
          remedy: `Feed it from ${cure}, as behind a 4-pin plug.`,
        }
      : {
          message: `Whether ${nameOf(drive)} obeys contact 3 is not known, and ${placeOf(outlet)} puts 3.3 V there.`,
          remedy: `Read it off the drive's manual. If the drive does not appear, try ${cure}, before calling it dead.`,
        }
  },
})
