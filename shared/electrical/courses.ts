import type { ResolvedPart } from '../build/resolve.ts'
import { momentIds, type MomentId } from '../check/result.ts'
import { hasStart, isMotorDrive, isSolidState, type RailCurrents, type State } from './deviceCurrents.ts'
import type { StartPlan } from './startPlan.ts'

/** From this time on the device is in this state. The first entry of a course is at zero. */
export interface Segment {
  from: number
  state: State
}
export type Course = readonly Segment[]

const constant = (state: State): Course => [{ from: 0, state }]
const starting = constant('starting')
const resting = constant('resting')
const scanning = constant('scanning')
const writing = constant('writing')

/**
 * What a device does on one rail during each moment.
 *
 * - Cold start: everything that has a start takes its peak at once; what has none works as hard as in a scan.
 * - Staged start: a drive waits, takes its start peak for its seconds, then rests. Its controller's groups set when.
 * - Wake: drives that may sleep (motors that are neither cache nor boot) start while all else scans: all of them at
 *   once, or group after group where the staging also holds after sleep. That is so for starts given by the
 *   controller or by command; contact 11 delays the first start after power-on only [S39].
 * - Full scan: everything works. Write burst: as that, solid-state drives at their write peak. At rest: all ready.
 *
 * Times of the staged start are seconds; those of a wake are turns.
 */
function courseOf(moment: MomentId, part: ResolvedPart, currents: RailCurrents, plan: StartPlan): Course {
  switch (moment) {
    case 'cold-start':
      return hasStart(part) ? starting : scanning
    case 'staged-start':
      return stagedCourse(part, currents, plan)
    case 'wake':
      return wakeCourse(part, plan)
    case 'full-scan':
      return scanning
    case 'write-burst':
      return isSolidState(part) ? writing : scanning
    case 'at-rest':
      return resting
  }
}

/** The courses of all moments, in the order of `momentIds`. */
export const coursesOf = (part: ResolvedPart, currents: RailCurrents, plan: StartPlan): Course[] =>
  momentIds.map((moment) => courseOf(moment, part, currents, plan))

function stagedCourse(part: ResolvedPart, { start_s }: RailCurrents, plan: StartPlan): Course {
  if (!hasStart(part)) return scanning
  const group = plan.groupOf.get(part.index)
  const begins = group === undefined ? 0 : group * plan.interval_s
  const after: State = part.model.kind === 'drive' ? 'resting' : 'scanning'
  const started: Segment[] =
    start_s > 0
      ? [
          { from: begins, state: 'starting' },
          { from: begins + start_s, state: after },
        ]
      : [{ from: begins, state: after }]
  return begins > 0 ? [{ from: 0, state: 'waiting' }, ...started] : started
}

/** A drive that the system may let fall asleep. */
export const maySleep = (part: ResolvedPart): boolean =>
  isMotorDrive(part) && part.part.role !== 'cache' && part.part.role !== 'boot'

function wakeCourse(part: ResolvedPart, plan: StartPlan): Course {
  if (!maySleep(part)) return scanning
  const turn = plan.by === 'device-pin' ? undefined : plan.groupOf.get(part.index)
  if (turn === undefined) return plan.staged && plan.by !== 'device-pin' ? startFirst : starting
  const course: Segment[] = [
    { from: turn, state: 'starting' },
    { from: turn + 1, state: 'scanning' },
  ]
  return turn > 0 ? [{ from: 0, state: 'scanning' }, ...course] : course
}

const startFirst: Course = [
  { from: 0, state: 'starting' },
  { from: 1, state: 'scanning' },
]
