import { computed, reactive, toValue, type MaybeRefOrGetter } from 'vue'
import { resolve } from '#shared/build/resolve.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { chooseLabels } from '#shared/paper/labels/choose.ts'
import { labelGroups, type LabelGroup } from '#shared/paper/labels/label.ts'
import { printLabels } from '#shared/paper/labels/labelPages.ts'
import { labelsOf } from '#shared/paper/labels/spareLabels.ts'
import { cellsOf } from '#shared/paper/labels/sheet.ts'
import { useDiagramStore } from '../../stores/diagram.ts'
import type { useLabelSheets } from './useLabelSheets.ts'

/** What is printed now: kept for this visit only. */
export interface LabelWishes {
  groups: LabelGroup[]
  freeEnds: boolean
  /** Only what says something else than in this revision; null: everything. */
  since: number | null
  start: number
  edges: boolean
}

/** Everything, on a fresh sheet. */
export const makeWishes = (): LabelWishes =>
  reactive({ groups: [...labelGroups], freeEnds: true, since: null, start: 0, edges: false })

/** The labels of the open build, chosen and laid on their sheets. `before` is the document of the revision to compare with. */
export function useLabelPrint(
  { settings, sheet }: ReturnType<typeof useLabelSheets>,
  wishes: LabelWishes,
  before: MaybeRefOrGetter<BuildDocument | null>,
) {
  const diagram = useDiagramStore()
  const labels = computed(() => (diagram.build ? labelsOf(diagram.build) : []))
  const old = computed(() => {
    const document = toValue(before)
    return document && diagram.catalog ? labelsOf(resolve(document, diagram.catalog)) : null
  })
  const chosen = computed(() =>
    wishes.since === null
      ? chooseLabels(labels.value, wishes)
      : old.value
        ? chooseLabels(labels.value, wishes, old.value)
        : { print: [], gone: [] },
  )
  const counts = computed(() => {
    const found: Record<LabelGroup, number> = { power: 0, data: 0, tray: 0, spare: 0 }
    for (const { group } of labels.value) found[group]++
    return found
  })
  const start = computed(() => Math.min(wishes.start, cellsOf(sheet.value) - 1))
  const print = computed(() => {
    const { form, diameter_mm, offsetX_mm, offsetY_mm } = settings.value
    const { document } = diagram
    const title = `Labels, ${document?.machine ?? document?.name ?? ''}`
    const options = {
      sheet: sheet.value,
      form,
      diameter_mm,
      offsetX_mm,
      offsetY_mm,
      start: start.value,
      edges: wishes.edges,
    }
    return printLabels(chosen.value.print, options, title)
  })

  return { labels, chosen, counts, start, print }
}
