import { useLocalStorage } from '@vueuse/core'
import { computed } from 'vue'
import { z } from 'zod'
import { labelForms } from '#shared/paper/labels/forms.ts'
import { labelSheets, labelSheetSchema, sheetProblems, type LabelSheet } from '#shared/paper/labels/sheet.ts'
import { usePreferencesStore } from '../../stores/preferences.ts'

const settingsSchema = z.object({
  sheet: z.string(),
  form: z.enum(labelForms),
  diameter_mm: z.number().min(1).max(30),
  offsetX_mm: z.number().min(-20).max(20),
  offsetY_mm: z.number().min(-20).max(20),
  own: z.array(labelSheetSchema).max(50),
})
type Settings = z.infer<typeof settingsSchema>

/** Which sheet lies in this printer, how labels sit on cables, and own sizes. Kept in the browser: they belong to the printer. */
export function useLabelSheets() {
  const preferences = usePreferencesStore()
  const initial: Settings = {
    sheet: preferences.paper === 'letter' ? 'letter-30' : 'a4-21',
    form: 'wrap',
    diameter_mm: 6.5,
    offsetX_mm: 0,
    offsetY_mm: 0,
    own: [],
  }
  const settings = useLocalStorage<Settings>('bayloom.labels', initial, {
    serializer: { read: (raw) => readSettings(raw) ?? initial, write: (value) => JSON.stringify(value) },
    writeDefaults: false,
  })
  const sheets = computed<readonly LabelSheet[]>(() => [...labelSheets, ...settings.value.own])
  const sheet = computed(() => sheets.value.find(({ id }) => id === settings.value.sheet) ?? labelSheets[0]!)
  const isOwn = computed(() => settings.value.own.some(({ id }) => id === sheet.value.id))
  const source = computed(() => labelSheets.find(({ id }) => id === sheet.value.id)?.source ?? 'own size')

  /** Keeps an own size and chooses it; the same id replaces. */
  function keep(own: LabelSheet): void {
    const others = settings.value.own.filter(({ id }) => id !== own.id)
    settings.value = { ...settings.value, own: [...others, own], sheet: own.id }
  }

  function forget(id: string): void {
    const own = settings.value.own.filter((one) => one.id !== id)
    settings.value = { ...settings.value, own, sheet: initial.sheet }
  }

  return { settings, sheets, sheet, isOwn, source, keep, forget }
}

/** Null where what is stored cannot be used any more. */
function readSettings(raw: string): Settings | null {
  try {
    const parsed = settingsSchema.safeParse(JSON.parse(raw))
    return parsed.success && parsed.data.own.every((sheet) => sheetProblems(sheet).length === 0) ? parsed.data : null
  } catch {
    return null
  }
}
