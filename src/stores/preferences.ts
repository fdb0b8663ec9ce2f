import { useLocalStorage, usePreferredDark } from '@vueuse/core'
import { defineStore } from 'pinia'
import { computed } from 'vue'
import { z } from 'zod'

export const themes = ['system', 'light', 'dark'] as const
export const wireUnits = ['awg', 'mm2'] as const
export const lengthUnits = ['mm', 'in'] as const
export const papers = ['a4', 'letter'] as const

export type WireUnit = (typeof wireUnits)[number]
export type LengthUnit = (typeof lengthUnits)[number]
export type Paper = (typeof papers)[number]

/** Regions whose offices keep Letter paper and inches. */
const letterRegions = new Set(['US', 'CA', 'MX', 'PH', 'CL', 'CO', 'VE'])

/** What a person sees first, by the language their browser asks for. */
export function defaultsFor(language: string): { length: LengthUnit; wire: WireUnit; paper: Paper } {
  const region = language.split('-')[1]?.toUpperCase() ?? ''
  return { length: region === 'US' ? 'in' : 'mm', wire: 'awg', paper: letterRegions.has(region) ? 'letter' : 'a4' }
}

/** Stored text that is none of the known values counts as not stored. */
const oneOf = <T extends string>(values: readonly T[], fallback: T) => ({
  read: (raw: string): T => {
    const parsed = z.enum(values as readonly [T, ...T[]]).safeParse(raw)
    return parsed.success ? (parsed.data as T) : fallback
  },
  write: (value: T): string => value,
})

const remembered = <T extends string>(name: string, values: readonly T[], fallback: T) =>
  useLocalStorage<T>(`bayloom.${name}`, fallback, { serializer: oneOf(values, fallback), writeDefaults: false })

/** How this browser shows things: theme, units, paper. Kept in the browser, not on the server. */
export const usePreferencesStore = defineStore('preferences', () => {
  const defaults = defaultsFor(navigator.language)
  const theme = remembered('theme', themes, 'system')
  const wire = remembered('wire', wireUnits, defaults.wire)
  const length = remembered('length', lengthUnits, defaults.length)
  const paper = remembered('paper', papers, defaults.paper)

  const systemIsDark = usePreferredDark()
  const isDark = computed(() => theme.value === 'dark' || (theme.value === 'system' && systemIsDark.value))

  return { theme, wire, length, paper, isDark }
})
