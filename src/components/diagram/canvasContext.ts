import { inject, type InjectionKey, type Ref, type ShallowRef } from 'vue'
import type { Severity } from '#shared/check/severity.ts'

/** What nodes read from the canvas that they stand on. */
export interface CanvasContext {
  /** Worst open finding that names a part, by part id. */
  partMarks: Readonly<Ref<ReadonlyMap<string, Severity>>>
  /** Worst open finding that names a connector, by `part/connector`. */
  connectorMarks: Readonly<Ref<ReadonlyMap<string, Severity>>>
  /** Connectors that the run being drawn may end at; null while none is drawn. */
  mates: Readonly<Ref<ReadonlySet<string> | null>>
  /** Node that the keyboard stands on. */
  current: Readonly<ShallowRef<string | null>>
}

export const canvasKey: InjectionKey<CanvasContext> = Symbol('canvas')

export function useCanvasContext(): CanvasContext {
  const context = inject(canvasKey)
  if (!context) throw new Error('a node stands on a DiagramCanvas')
  return context
}
