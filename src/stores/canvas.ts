import { defineStore } from 'pinia'
import { ref, shallowRef } from 'vue'
import type { MomentId } from '#shared/check/result.ts'
import type { ExplainTarget } from '#shared/electrical/explain.ts'
import type { RailView } from '../diagram/amperes.ts'

/** Acts of the canvas that others ask for, as a toolbar or a key; the canvas fills them in while it stands. */
export interface CanvasActs {
  fit(): void
  zoomBy(factor: number): void
  /** Middle of what is in view, in places of the sheet. */
  middle(): { x: number; y: number }
}

/** How the picture is looked at: one rail or all, and the canvas that can be told to move. */
export const useCanvasStore = defineStore('canvas', () => {
  const rail = ref<RailView>('all')
  const acts = shallowRef<CanvasActs | null>(null)
  /** Node that the keyboard stands on. */
  const current = shallowRef<string | null>(null)
  /** Dialog that is asked for. */
  const dialog = ref<'connect' | 'outlets' | 'keys' | 'duplicate' | 'settings' | null>(null)
  /** Number whose making is asked for. */
  const explaining = shallowRef<{ target: ExplainTarget; moment: MomentId } | null>(null)
  /** Drive whose replacement is under way. */
  const replacing = shallowRef<string | null>(null)
  return { explaining, replacing, rail, acts, current, dialog }
})
