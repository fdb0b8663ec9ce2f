import type { ResolvedPart } from '../../build/resolve.ts'
import { partSubject } from '../../check/subjects.ts'
import { amount, nameOf, refsOf } from '../../check/words.ts'
import type { Controller } from '../../catalog/model.ts'
import { highFigure, isShaky, lowFigure } from '../../datapath/parts.ts'
import type { DataResult, ResolvedController } from '../../datapath/result.ts'
import { figureOf } from '../../electrical/figures.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  controller: ResolvedController
  drives: readonly ResolvedPart[]
  largest_TB: number
  limit_TB: number
}

/** What 32-bit block numbers reach with 512-byte sectors: 2^32 x 512 bytes. */
export const blockLimit512_TB = (2 ** 32 * 512) / 1e12

export const capacityCeiling = defineRule<Facts>({
  meta: {
    id: 'capacity-ceiling',
    title: 'A drive larger than its controller addresses',
    severities: ['fault'],
    finds: 'A drive with more capacity than its controller can address.',
    why: 'Block numbers of 32 bits end at 2.2 TB with 512-byte sectors: a larger drive is seen short, or not at all, and an array made on it is lost when the controller is changed.',
    needs: ['largest capacity of each controller', 'capacity and sector size of each drive'],
    sources: ['R68', 'R67'],
  },
  check({ data }) {
    return data.controllers.flatMap((controller) => {
      const limit = controller.controller.maxCapacity_TB
      const beyond = drivesBeyond(data, controller)
      if (!limit || beyond.length === 0) return []
      const largest_TB = Math.max(...beyond.map((drive) => highFigure(drive.model.drive?.capacity_TB) ?? 0))
      const limit_TB = ceiling_TB(controller.controller, beyond[0]) ?? 0
      return [
        {
          severity: 'fault' as const,
          subjects: [partSubject(controller.part), ...beyond.map(partSubject)],
          detail: controller.controller.id,
          load: largest_TB,
          limit: limit_TB,
          unit: 'TB' as const,
          decidedBy: [figureOf(limit, `largest drive of ${nameOf(controller.part)}`, 'TB')],
          about: isShaky(limit),
          facts: { controller, drives: beyond, largest_TB, limit_TB },
        },
      ]
    })
  },
  words({ facts: { controller, drives, largest_TB, limit_TB } }) {
    return {
      message: `${nameOf(controller.part)} addresses ${amount(limit_TB, 'TB')} a drive; ${refsOf(drives)} ${drives.length === 1 ? 'holds' : 'hold up to'} ${amount(largest_TB, 'TB')}.`,
      remedy: 'Use a controller without this limit for these drives (newer firmware does not lift it).',
    }
  },
})

function drivesBeyond(data: DataResult, controller: ResolvedController): ResolvedPart[] {
  const beyond = new Set<ResolvedPart>()
  if (!controller.controller.maxCapacity_TB) return []
  for (const path of data.paths) {
    if (path.controller !== controller || path.fault?.kind === 'protocol') continue
    const capacity_TB = highFigure(path.drive.model.drive?.capacity_TB)
    const limit_TB = ceiling_TB(controller.controller, path.drive)
    if (capacity_TB !== null && limit_TB !== null && capacity_TB > limit_TB) beyond.add(path.drive)
  }
  return [...beyond]
}

/** A controller that hands on 4096-byte sectors counts them as it counts small ones: eight times the reach. */
function ceiling_TB(controller: Controller, drive: ResolvedPart | undefined): number | null {
  const limit_TB = lowFigure(controller.maxCapacity_TB)
  const logical_B = drive?.model.drive?.sectors?.logical_B ?? 512
  const countsBlocks = limit_TB !== null && Math.abs(limit_TB - blockLimit512_TB) < 0.01
  return countsBlocks && controller.sectors_B?.includes(logical_B) ? (limit_TB * logical_B) / 512 : limit_TB
}
