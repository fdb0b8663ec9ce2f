import type { ResolvedPart } from '../../build/resolve.ts'
import { partSubject } from '../../check/subjects.ts'
import { nameOf } from '../../check/words.ts'
import type { Quantity } from '../../quantity/quantity.ts'
import { isShaky, lowFigure } from '../../datapath/parts.ts'
import type { DataResult } from '../../datapath/result.ts'
import { defineRule } from '../rule.ts'
import { figureOf } from '../../electrical/figures.ts'

interface Facts {
  part: ResolvedPart
  name: string
  count: number
  limit: number
}

interface Counted {
  part: ResolvedPart
  id: string
  name: string
  limit: Quantity
  drives: Set<ResolvedPart>
}

export const tooManyDevices = defineRule<Facts>({
  meta: {
    id: 'too-many-devices',
    title: 'More drives than can be addressed',
    severities: ['fault'],
    finds: 'More drives behind a controller or expander than it can address.',
    why: 'Drives past the limit are not seen, and which ones drop out can change from start to start.',
    needs: ['lanes from every controller', 'largest number of devices of controllers and expanders'],
    sources: ['R53', 'R56', 'R64'],
  },
  check({ data }) {
    return counts(data).flatMap(({ part, id, name, limit, drives }) => {
      const most = lowFigure(limit)
      if (most === null || drives.size <= most) return []
      return [
        {
          severity: 'fault' as const,
          subjects: [partSubject(part), ...[...drives].map(partSubject)],
          detail: id,
          load: drives.size,
          limit: most,
          unit: '' as const,
          decidedBy: [figureOf(limit, `largest number of drives of ${name}`, '')],
          about: isShaky(limit),
          facts: { part, name, count: drives.size, limit: most },
        },
      ]
    })
  },
  words({ facts: { name, count, limit } }) {
    return {
      message: `${count} drives hang on ${name}, which addresses ${limit}.`,
      remedy: `Move ${count - limit} of them to another controller.`,
    }
  },
})

function counts(data: DataResult): Counted[] {
  const found = new Map<string, Counted>()
  const count = (key: string, counted: Omit<Counted, 'drives'>, drive: ResolvedPart) => {
    const known = found.get(key) ?? { ...counted, drives: new Set() }
    known.drives.add(drive)
    found.set(key, known)
  }
  for (const { controller, expanders, drive, fault } of data.paths) {
    if (fault?.kind === 'protocol') continue
    const { part, controller: host } = controller
    const name = part.model.controllers.length > 1 ? `${host.name} of ${nameOf(part)}` : nameOf(part)
    count(`${part.index}.${host.id}`, { part, id: host.id, name, limit: host.maxDevices }, drive)
    for (const expander of expanders) {
      const limit = expander.model.expander?.maxDevices
      if (limit) count(`${expander.index}`, { part: expander, id: 'expander', name: nameOf(expander), limit }, drive)
    }
  }
  return [...found.values()]
}
