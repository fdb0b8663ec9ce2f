import { computed } from 'vue'
import type { Severity } from '#shared/check/severity.ts'
import { markJoints, worse } from '../diagram/strain.ts'
import { useChecksStore } from '../stores/checks.ts'
import { useDiagramStore } from '../stores/diagram.ts'

/** The worst verdict on each joint at the chosen moment, and on each part and connector at any. */
export function useCanvasMarks() {
  const diagram = useDiagramStore()
  const checks = useChecksStore()
  const settings = computed(() => diagram.build?.settings ?? { derating: 0.8, shortTimeAllowance: 1.25 })
  const marks = computed(() =>
    markJoints(checks.flows, checks.result?.findings ?? [], checks.shown?.moment ?? 'cold-start', settings.value),
  )
  const partMarks = computed(() => worstBy((subject) => subject.part))
  const connectorMarks = computed(() => {
    const worst = worstBy(({ part, connector }) =>
      part !== undefined && connector !== undefined ? `${part}/${connector}` : undefined,
    )
    // A run past its limit fills the plugs at both its ends.
    for (const [id, severity] of marks.value) {
      const joint = severity === 'caution' ? undefined : diagram.build?.jointById.get(id)
      for (const end of joint ? [joint.a, joint.b] : []) {
        const key = `${end.part.part.id}/${end.connector.id}`
        worst.set(key, worse(worst.get(key) ?? null, severity) ?? severity)
      }
    }
    return worst
  })

  function worstBy(keyOf: (subject: { part?: string; connector?: string }) => string | undefined) {
    const worst = new Map<string, Severity>()
    for (const finding of checks.open) {
      if (finding.severity === 'note') continue
      for (const subject of finding.subjects) {
        const key = keyOf(subject)
        const next = key === undefined ? null : worse(worst.get(key) ?? null, finding.severity)
        if (key !== undefined && next) worst.set(key, next)
      }
    }
    return worst
  }

  return { marks, partMarks, connectorMarks }
}
