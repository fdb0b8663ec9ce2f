import { useLocalStorage } from '@vueuse/core'
import { computed } from 'vue'
import { z } from 'zod'
import { codeAddressSchema } from '#shared/contract/lidSheet.ts'
import { paperNames, viewNames } from '#shared/paper/lid/content.ts'
import { diagramChoices } from '#shared/paper/lid/pages.ts'
import { usePreferencesStore } from '../../stores/preferences.ts'

const optionsSchema = z.object({
  paper: z.enum(paperNames),
  colour: z.boolean(),
  diagram: z.enum(diagramChoices),
  seenFrom: z.enum([...viewNames, 'case']),
  contact: z.string().max(300),
  address: z.string().max(400),
})
export type LidChoices = z.infer<typeof optionsSchema>

/** How the lid sheet of one build is printed. Kept in the browser: paper and contact belong to who prints. */
export function useLidOptions(buildId: string, livePlan: string) {
  const preferences = usePreferencesStore()
  const initial: LidChoices = {
    paper: preferences.paper,
    colour: false,
    diagram: 'auto',
    seenFrom: 'case',
    contact: '',
    address: livePlan,
  }
  const options = useLocalStorage<LidChoices>(`bayloom.lid.${buildId}`, initial, {
    serializer: { read: (raw) => readOptions(raw) ?? initial, write: (value) => JSON.stringify(value) },
    writeDefaults: false,
  })
  const address = computed(() => options.value.address.trim())
  const addressProblem = computed(() =>
    address.value === '' || codeAddressSchema.safeParse(address.value).success
      ? ''
      : 'Write a whole address, beginning with https:// or http://.',
  )
  const goodAddress = computed(() => (addressProblem.value === '' ? address.value : ''))
  return { options, addressProblem, goodAddress }
}

/** Null where what is stored cannot be used any more. */
function readOptions(raw: string): LidChoices | null {
  try {
    const parsed = optionsSchema.safeParse(JSON.parse(raw))
    return parsed.success ? parsed.data : null
  } catch {
    return null
  }
}
