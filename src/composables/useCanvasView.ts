import type { VueFlowStore } from '@vue-flow/core'
import { computed } from 'vue'
import { useDiagramStore } from '../stores/diagram.ts'

/** A sheet is first shown whole down to this zoom; below it, its strip is shown at the other. */
const leastWhole = 0.3
const leastFirstZoom = 0.42

/** Where the eye stands over the sheet: first look, fitting, and what can be read from there. */
export function useCanvasView(flow: VueFlowStore) {
  const diagram = useDiagramStore()
  const quiet = (): number => (matchMedia('(prefers-reduced-motion: reduce)').matches ? 0 : 160)

  function isInView(node: { x: number; y: number; width: number; height: number }, leastZoom: number): boolean {
    const { x, y, zoom } = flow.viewport.value
    const { width, height } = flow.dimensions.value
    if (zoom < leastZoom) return false
    const left = node.x * zoom + x
    const top = node.y * zoom + y
    return left >= 0 && top >= 0 && left + node.width * zoom <= width && top + node.height * zoom <= height
  }

  const fit = () => void flow.fitView({ padding: 0.06, maxZoom: 1.1, duration: quiet() })

  /** The whole sheet where it can then be read; of a larger one the top of the strip. */
  function firstView(): void {
    const { drawing } = diagram
    const { width, height } = flow.dimensions.value
    if (!drawing || drawing.nodes.length === 0 || width === 0) return
    const { bounds } = drawing
    const whole = Math.min(width / (bounds.width * 1.08), height / (bounds.height * 1.08))
    if (whole >= leastWhole) {
      void flow.fitView({ padding: 0.06, maxZoom: 1.1 })
      return
    }
    const strip = drawing.nodes.find((node) => node.kind === 'case') ?? bounds
    const zoom = leastFirstZoom
    const wide = bounds.width * zoom > width * 0.96
    const x = wide ? width / 2 - (strip.x + strip.width / 2) * zoom : width / 2 - (bounds.x + bounds.width / 2) * zoom
    void flow.setViewport({ x, y: 16 - Math.min(strip.y, bounds.y) * zoom, zoom })
  }

  /** Far off, only what can be read is written, and larger; small print comes back on the way in. */
  const reach = computed(() => {
    const { zoom } = flow.viewport.value
    return zoom < 0.38 ? 'far farther farthest' : zoom < 0.58 ? 'far farther' : zoom < 0.8 ? 'far' : ''
  })

  return { quiet, isInView, fit, firstView, reach }
}
