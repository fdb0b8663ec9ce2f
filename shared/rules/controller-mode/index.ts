import type { ResolvedPart } from '../../build/resolve.ts'
import { partSubject } from '../../check/subjects.ts'
import { nameOf, refsOf } from '../../check/words.ts'
import type { DataResult, ResolvedController } from '../../datapath/result.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  controller: ResolvedController
  state: 'set to combine' | 'only combines' | 'not stated'
  drives: readonly ResolvedPart[]
}

export const controllerMode = defineRule<Facts>({
  meta: {
    id: 'controller-mode',
    title: 'Array needs pass-through',
    severities: ['fault', 'note'],
    finds: 'An array that needs drives passed through, on a controller that combines drives itself.',
    why: 'A controller that combines drives hides serials, health and sector sizes from the system and writes its own marks on the drives: the array software cannot do its work, and the drives cannot be moved to another controller.',
    needs: ['settings: array needs pass-through', 'modes of each controller', 'mode that this one is set to'],
    sources: ['R63', 'R75'],
    disputed:
      'Some controllers offer a mode that hands on single drives beside combined ones; projects disagree whether that is enough.',
  },
  check({ build, data }) {
    if (!build.settings.array.needsPassThrough) return []
    return data.controllers.flatMap((controller) => {
      const state = stateOf(controller)
      const drives = state ? arrayDrives(data, controller) : []
      if (!state || drives.length === 0) return []
      return [
        {
          severity: state === 'not stated' ? ('note' as const) : ('fault' as const),
          subjects: [partSubject(controller.part), ...drives.map(partSubject)],
          detail: controller.controller.id,
          facts: { controller, state, drives },
        },
      ]
    })
  },
  words({ facts: { controller, state, drives } }) {
    const name = nameOf(controller.part)
    const whom = refsOf(drives)
    switch (state) {
      case 'set to combine':
        return {
          message: `${name} is set to combine drives itself; the array needs ${whom} passed through.`,
          remedy: `Set ${name} to pass-through (often another firmware) before data is written, and say so on the plan.`,
        }
      case 'only combines':
        return {
          message: `${name} always combines drives itself; the array needs ${whom} passed through.`,
          remedy: 'Use a controller that passes drives through.',
        }
      case 'not stated':
        return {
          message: `${name} can pass drives through or combine them; which one it is set to is not stated. The array needs ${whom} passed through.`,
          remedy: 'Look at its firmware and state the mode on the plan.',
        }
    }
  },
})

function stateOf({ part, controller }: ResolvedController): Facts['state'] | null {
  const { modes } = controller
  if (!modes.includes('combined')) return null
  if (!modes.includes('pass-through')) return 'only combines'
  if (part.part.mode === undefined) return 'not stated'
  return part.part.mode === 'combined' ? 'set to combine' : null
}

/** Drives that the array may use: all but the one that the system starts from. */
function arrayDrives(data: DataResult, controller: ResolvedController): ResolvedPart[] {
  const drives = data.paths
    .filter((path) => path.controller === controller && path.fault === null && path.drive.part.role !== 'boot')
    .map((path) => path.drive)
  return [...new Set(drives)]
}
