import type { ResolvedBuild } from '#shared/build/resolve.ts'
import type { TimelineStep } from '#shared/check/result.ts'

/** One supply or converter rail's current over the seconds of a staged start. */
export interface RailCourse {
  name: string
  limit_A: number | null
  points: { x: number; y: number }[]
}

/** Turns steps into one course a rail, with the limit that it is read against. */
export function railCourses(steps: readonly TimelineStep[], build: ResolvedBuild): RailCourse[] {
  const courses = new Map<string, RailCourse>()
  for (const step of steps)
    for (const { part, rail, current_A } of step.rails) {
      const key = `${part}/${rail}`
      const supply = build.partById.get(part)
      const made = [...(supply?.model.supply?.rails ?? []), ...(supply?.model.converters ?? [])]
      const limit = made.find((one) => one.id === rail)?.limit_A
      const course = courses.get(key) ?? {
        name: `${supply?.part.ref ?? part} ${rail.replace(/V(?=\d|$)/, ' V ').trim()}`,
        limit_A: limit?.value ?? limit?.low ?? null,
        points: [],
      }
      course.points.push({ x: step.from_s, y: current_A })
      courses.set(key, course)
    }
  return [...courses.values()]
}
