import type { BuildDocument } from '#shared/build/document.ts'
import type { Catalog } from '#shared/catalog/catalog.ts'

/** Milliseconds of each frame, and of the script, style and layout in it. */
export interface FrameTimes {
  frame: number[]
  work: number[]
}

/** What the bench asks of its page. */
export interface CanvasBench {
  mount(what: 'own' | 'bare', document: BuildDocument, catalog: Catalog): Promise<{ nodes: number; runs: number }>
  /** While a node or the sheet follows the pointer. */
  time(what: 'drag' | 'pan', frames: number): Promise<FrameTimes>
  /** From an edit to the canvas that shows it, without the check. */
  timeEdit(times: number): Promise<number[]>
}
