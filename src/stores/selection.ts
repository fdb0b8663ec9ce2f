import { defineStore } from 'pinia'
import { computed, ref, shallowRef } from 'vue'
import type { JointEnd } from '#shared/build/document.ts'
import type { Subject } from '#shared/check/result.ts'

/** What is lit because a finding, a ledger row or a drive points at it. */
export interface Lit {
  parts: ReadonlySet<string>
  joints: ReadonlySet<string>
  /** `part/connector`. */
  connectors: ReadonlySet<string>
}

/** What should be brought into view; `near` so that it can be read. */
export interface Shown {
  parts: readonly string[]
  joints: readonly string[]
  near: boolean
  at: number
}

const nothing: ReadonlySet<string> = new Set()
const dark: Lit = { parts: nothing, joints: nothing, connectors: nothing }

export const connectorKey = (end: JointEnd): string => `${end.part}/${end.connector}`

/** What the person has chosen, points at, or asked to be shown. Ids only: the document is elsewhere. */
export const useSelectionStore = defineStore('selection', () => {
  const parts = shallowRef<ReadonlySet<string>>(nothing)
  const joints = shallowRef<ReadonlySet<string>>(nothing)
  const connector = shallowRef<JointEnd | null>(null)
  /** Bay under the pointer, as `case#slot`. */
  const bay = ref<string | null>(null)
  const lit = shallowRef<Lit>(dark)
  /** Raised each time that something should be brought into view. */
  const show = shallowRef<Shown | null>(null)
  let shown = 0

  const onlyPart = computed(() => (parts.value.size === 1 && joints.value.size === 0 ? [...parts.value][0] : undefined))
  const onlyJoint = computed(() =>
    joints.value.size === 1 && parts.value.size === 0 ? [...joints.value][0] : undefined,
  )
  const isEmpty = computed(() => parts.value.size + joints.value.size === 0)

  function choose(chosen: { parts?: Iterable<string>; joints?: Iterable<string>; connector?: JointEnd | null }): void {
    parts.value = new Set(chosen.parts)
    joints.value = new Set(chosen.joints)
    connector.value = chosen.connector ?? null
  }

  function toggle(kind: 'parts' | 'joints', id: string): void {
    const target = kind === 'parts' ? parts : joints
    const next = new Set(target.value)
    if (!next.delete(id)) next.add(id)
    target.value = next
    connector.value = null
  }

  function clear(): void {
    choose({})
    lit.value = dark
  }

  /** Lights subjects and brings them into view. */
  function light(subjects: readonly Subject[], bringIntoView = true): void {
    const litParts = subjects.flatMap((subject) => subject.part ?? [])
    const litJoints = subjects.flatMap((subject) => subject.joint ?? [])
    const connectors = subjects.flatMap((subject) =>
      subject.part !== undefined && subject.connector !== undefined
        ? connectorKey({ part: subject.part, connector: subject.connector })
        : [],
    )
    lit.value = { parts: new Set(litParts), joints: new Set(litJoints), connectors: new Set(connectors) }
    if (bringIntoView) reveal(litParts, litJoints, true)
  }

  function reveal(partIds: readonly string[], jointIds: readonly string[] = [], near = false): void {
    show.value = { parts: partIds, joints: jointIds, near, at: ++shown }
  }

  return {
    parts,
    joints,
    connector,
    bay,
    lit,
    show,
    onlyPart,
    onlyJoint,
    isEmpty,
    choose,
    toggle,
    clear,
    light,
    reveal,
  }
})
