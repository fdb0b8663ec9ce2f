import type { ResolvedConnector, ResolvedPart } from '../../build/resolve.ts'
import { jointSubject, partSubject } from '../../check/subjects.ts'
import { nameOf, placeOf } from '../../check/words.ts'
import { defineRule, type RawFinding } from '../rule.ts'

interface Facts {
  lead: ResolvedPart
  socket: ResolvedConnector
  kind: 'other-family' | 'unknown-family' | 'void-test'
}

export const foreignLead = defineRule<Facts>({
  meta: {
    id: 'foreign-lead',
    title: 'A modular lead of another supply',
    severities: ['danger', 'caution'],
    finds:
      'Modular leads on a supply of another pinout family, or of one that is not known, without a pin test on record.',
    why: 'No standard covers the supply side of a modular lead: a plug that fits may put 12 V where 5 V belongs, and destroys every drive on it the moment it is switched on.',
    needs: ['pinout family of supply and lead', 'pin test of the lead on this supply'],
    sources: ['S68'],
  },
  check({ build }) {
    return build.joints.flatMap((joint): RawFinding<Facts>[] => {
      for (const [socket, plug] of [
        [joint.a, joint.b],
        [joint.b, joint.a],
      ] as const) {
        const kind = socket.part.model.supply && joint.mating.mates ? kindOf(socket, plug) : null
        if (kind)
          return [
            {
              severity: kind === 'unknown-family' ? 'caution' : 'danger',
              subjects: [jointSubject(joint), partSubject(plug.part), partSubject(socket.part)],
              facts: { lead: plug.part, socket, kind },
            },
          ]
      }
      return []
    })
  },
  words({ facts }) {
    const { lead, socket, kind } = facts
    const supply = nameOf(socket.part)
    const measure =
      'Before it is joined, measure every pin of the lead against the supply with the supply off its drives, and put the pin test on record; or use the lead that came with the supply.'
    switch (kind) {
      case 'other-family':
        return {
          message: `${nameOf(lead)} is made for supplies of the family "${lead.model.pinoutFamily}", and ${placeOf(socket)} belongs to "${socket.part.model.pinoutFamily}": the plug fits, the pins may differ.`,
          remedy: measure,
        }
      case 'unknown-family':
        return {
          message: `Nobody has stated that ${nameOf(lead)} and ${supply} are of one pinout family: a plug that fits ${placeOf(socket)} may still be wired otherwise.`,
          remedy: measure,
        }
      case 'void-test':
        return {
          message: `The pin test of ${nameOf(lead)} was made on another supply than ${supply}: it does not hold here.`,
          remedy: measure,
        }
    }
  },
})

function kindOf(socket: ResolvedConnector, { part: lead }: ResolvedConnector): Facts['kind'] | null {
  // Only sockets without a standard of their own are at stake: captive outlets and standard plugs are all alike.
  if (!isModular(socket)) return null
  const test = lead.part.pinTest
  const supply = socket.part
  if (test && test.supply === supply.part.id && test.supplyModel === supply.model.id) return null
  const family = lead.model.pinoutFamily
  const wanted = supply.model.pinoutFamily
  if (family !== undefined && family === wanted) return null
  if (test) return 'void-test'
  return family === undefined || wanted === undefined ? 'unknown-family' : 'other-family'
}

/** A socket whose pins its maker chose. */
const isModular = ({ type }: ResolvedConnector): boolean => type.id.startsWith('modular-')
