import type { ResolvedBuild } from '../../build/resolve.ts'
import type { CheckResult } from '../../check/result.ts'
import { counted } from '../../check/words.ts'
import { refRanges } from '../diagram/partsBlock.ts'

/** Which motors start when: one line a group, or one for all. */
export function startGroupsOf(build: ResolvedBuild, result: CheckResult): string[] {
  const motors = build.parts.filter(({ model }) => (model.drive?.rotation_rpm ?? 0) > 0).map(({ part }) => part.ref)
  if (motors.length === 0) return ['No drive with a motor.']
  const { mode, by, interval_s } = build.settings.spinUp
  if (mode === 'together') return [`All ${counted(motors.length, 'motor')} start together: ${refRanges(motors)}.`]
  const words = { controller: 'the controller', 'device-pin': 'contact 11', 'standby-command': 'a command' }[by]
  const steps = result.timeline.filter(({ starting }) => starting.length > 0)
  return [
    `Staged by ${words}, every ${interval_s} s:`,
    ...steps.map(({ from_s, starting }, i) => {
      const refs = starting.flatMap((id) => build.partById.get(id)?.part.ref ?? [])
      return `${i + 1}. at ${Math.round(from_s * 10) / 10} s: ${refRanges(refs)}`
    }),
  ]
}
