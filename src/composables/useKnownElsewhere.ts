import { useQuery } from '@tanstack/vue-query'
import { computed, type ComputedRef } from 'vue'
import type { FoundDrive } from '#shared/contract/drives.ts'
import { serialKey } from '#shared/inventory/read.ts'
import { findDrives } from '../api/drives.ts'
import { useSessionStore } from '../stores/session.ts'

/** Serials that are looked up for one listing at most, one after the other. */
const mostAsked = 60
/** The search takes no less than this. */
const leastLetters = 3

interface KnownElsewhere {
  /** Where a serial stands in another build of one's own, by `serialKey`. */
  known: ComputedRef<ReadonlyMap<string, FoundDrive>>
  /** Serials that were not looked up: too many, too short, or the search did not answer. */
  unasked: ComputedRef<number>
}

/** Which of these serials other builds of one's own have. Without an account nothing is asked. */
export function useKnownElsewhere(serials: () => readonly string[], buildId: () => string | null): KnownElsewhere {
  const session = useSessionStore()
  const keys = computed(() => [...new Set(serials().map(serialKey))].sort())
  const asked = computed(() => keys.value.filter((key) => key.length >= leastLetters).slice(0, mostAsked))
  const { data, isError } = useQuery({
    queryKey: ['drives', 'elsewhere', buildId, asked],
    queryFn: async ({ signal }) => {
      const found: [string, FoundDrive][] = []
      for (const key of asked.value) {
        const { items } = await findDrives(key, signal)
        const other = items.find((one) => one.buildId !== buildId() && serialKey(one.serial) === key)
        if (other) found.push([key, other])
      }
      return found
    },
    enabled: () => session.user !== null && asked.value.length > 0,
  })
  return {
    known: computed(() => new Map(data.value ?? [])),
    unasked: computed(() => {
      if (session.user === null) return 0
      return isError.value ? keys.value.length : keys.value.length - asked.value.length
    }),
  }
}
