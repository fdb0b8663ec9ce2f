import type { ResolvedPart } from '../../build/resolve.ts'
import { partSubject } from '../../check/subjects.ts'
import { nameOf } from '../../check/words.ts'
import type { Bay, Drive } from '../../catalog/model.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  drive: ResolvedPart
  size: Drive['size']
  case: ResolvedPart
  bay: Bay
}

export const baySize = defineRule<Facts>({
  meta: {
    id: 'bay-size',
    title: 'A drive that does not fit its bay',
    severities: ['fault', 'caution'],
    finds: 'A drive larger than its bay, or smaller without a tray that takes it.',
    why: 'A drive that is too large does not go in; one that is too small hangs loose and misses the receptacle behind it unless a tray holds it in place.',
    needs: ['size of each drive', 'size of each bay and what else fits it'],
    sources: [],
    commonPractice: true,
  },
  check({ build }) {
    return build.parts.flatMap((drive) => {
      const { bay: place } = drive.part
      const size = drive.model.drive?.size
      const holder = place && build.partById.get(place.case)
      const bay = holder?.model.bays.find((candidate) => candidate.slot === place?.slot)
      if (!size || !holder || !bay || bay.size === size || bay.alsoFits.includes(size)) return []
      const smaller = size === '2.5' && bay.size === '3.5'
      return [
        {
          severity: smaller ? ('caution' as const) : ('fault' as const),
          subjects: [partSubject(drive), partSubject(holder)],
          facts: { drive, size, case: holder, bay },
        },
      ]
    })
  },
  words({ facts: { drive, size, case: holder, bay } }) {
    const name = size === 'M.2' ? 'an M.2 module' : `a ${size} in drive`
    const seat = `bay ${bay.slot} of ${nameOf(holder)}, which takes ${bay.size} in drives`
    return size === '2.5'
      ? {
          message: `${nameOf(drive)} is ${name} in ${seat}.`,
          remedy: 'Use a tray or adapter frame that holds it at the receptacle, or move it to a 2.5 in bay.',
        }
      : {
          message: `${nameOf(drive)} is ${name} and does not fit ${seat}.`,
          remedy: size === 'M.2' ? 'Place it in a socket of the board.' : 'Move it to a 3.5 in bay.',
        }
  },
})
