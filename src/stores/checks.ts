import { defineStore } from 'pinia'
import { computed, ref, shallowRef } from 'vue'
import type { CheckResult, Finding, JointFlow, MomentId } from '#shared/check/result.ts'

/** What the checker says of the open document, and the moment at which the picture is read. */
export const useChecksStore = defineStore('checks', () => {
  const result = shallowRef<CheckResult | null>(null)
  const moment = ref<MomentId>('cold-start')
  /** True while the document is newer than the result. */
  const isPending = ref(false)
  /** Set where the checker itself gave up; the last result stays on screen. */
  const trouble = ref<string | null>(null)
  const took_ms = ref<number | null>(null)

  const moments = computed(() => result.value?.moments.filter((one) => one.applies) ?? [])
  const shown = computed(() => moments.value.find((one) => one.moment === moment.value) ?? moments.value[0] ?? null)
  /** Currents at the moment shown, by joint. */
  const flows = computed<ReadonlyMap<string, JointFlow>>(
    () => new Map(shown.value?.joints.map((flow) => [flow.joint, flow])),
  )
  const open = computed<readonly Finding[]>(() => result.value?.findings.filter((finding) => !finding.accepted) ?? [])
  const accepted = computed<readonly Finding[]>(
    () => result.value?.findings.filter((finding) => finding.accepted) ?? [],
  )
  /** Open findings that point at a part, worst first. */
  const byPart = computed<ReadonlyMap<string, readonly Finding[]>>(() => {
    const map = new Map<string, Finding[]>()
    for (const finding of open.value)
      for (const part of new Set(finding.subjects.flatMap((subject) => subject.part ?? []))) {
        const list = map.get(part)
        if (list) list.push(finding)
        else map.set(part, [finding])
      }
    return map
  })

  return { result, moment, isPending, trouble, took_ms, moments, shown, flows, open, accepted, byPart }
})
