import { computed, ref, shallowRef } from 'vue'
import { listFigures } from '#shared/catalog/figureList.ts'
import type { Model } from '#shared/catalog/model.ts'
import { applyOverrides } from '#shared/build/overrides.ts'
import type { Quantity } from '#shared/quantity/quantity.ts'

/**
 * A model under the hand: its shape (counts, wires, traits) and the figures that somebody typed. Figures are kept by
 * path beside the shape, so that each can be taken back and shows as theirs.
 */
export function useModelDraft(start: Model) {
  const shape = shallowRef<Model>(start)
  const typed = ref<Record<string, Quantity>>({})
  const model = computed<Model>(() => applyOverrides(shape.value, typed.value, () => undefined))
  const groups = computed(() => listFigures(shape.value))

  /** Changes the shape. Where wires come or go, typed lengths move into it first: new pieces are copies of the last. */
  const reshape = (change: (model: Model) => Model): void => {
    const changed = change(shape.value)
    if (changed.wiring.length === shape.value.wiring.length) shape.value = changed
    else {
      const lengths = Object.entries(typed.value).filter(([path]) => path.startsWith('wiring.'))
      shape.value = change(applyOverrides(shape.value, Object.fromEntries(lengths), () => undefined))
      for (const [path] of lengths) delete typed.value[path]
    }
  }
  const type = (path: string, quantity: Quantity | undefined): void => {
    if (quantity) typed.value[path] = quantity
    else delete typed.value[path]
  }
  return { shape, typed, model, groups, reshape, type }
}
