import { defineStore } from 'pinia'
import { computed, shallowRef } from 'vue'
import { authorName, initials } from '#shared/activity/words.ts'
import type { Present } from '#shared/contract/live.ts'

/** Somebody else who has the open build open, in however many tabs. */
export interface Other {
  id: string
  name: string
  initials: string
  isGuest: boolean
  /** Ids of the parts and joints that they have chosen. */
  chosen: readonly string[]
}

/** This page, among all that the person may have open. */
export const ownTab = crypto.randomUUID()

/** Who else is in the open build, and where. */
export const usePresenceStore = defineStore('presence', () => {
  const present = shallowRef<readonly Present[]>([])
  const ownId = shallowRef<string | null>(null)

  const others = computed<readonly Other[]>(() => {
    const people = new Map<string, Other>()
    for (const { tab, by, chosen } of present.value) {
      if (tab === ownTab || by.kind === 'former') continue
      const id = by.kind === 'member' ? by.userId : by.guestId
      if (id === ownId.value) continue
      const name = authorName(by)
      const before = people.get(id)
      people.set(id, {
        id,
        name,
        initials: initials(name),
        isGuest: by.kind === 'guest',
        chosen: [...(before?.chosen ?? []), ...chosen],
      })
    }
    return [...people.values()].sort((a, b) => (a.name < b.name ? -1 : 1))
  })
  /** Who has chosen a part or joint, by its id. */
  const byChosen = computed<ReadonlyMap<string, readonly Other[]>>(() => {
    const map = new Map<string, Other[]>()
    for (const other of others.value)
      for (const id of new Set(other.chosen)) map.set(id, [...(map.get(id) ?? []), other])
    return map
  })

  return { present, ownId, others, byChosen }
})
