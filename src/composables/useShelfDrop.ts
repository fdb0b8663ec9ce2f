import type { VueFlowStore } from '@vue-flow/core'
import { addParts } from '#shared/build/edits/place.ts'
import { bayAt } from '../diagram/gestures.ts'
import { useDiagramStore } from '../stores/diagram.ts'

/** Places what was dragged from the parts shelf: into the bay under the hand, else where it was let go. */
export function useShelfDrop(flow: VueFlowStore) {
  const diagram = useDiagramStore()
  return function onDrop(event: DragEvent): void {
    const model = event.dataTransfer?.getData('application/x-bayloom-model')
    const { drawing, build } = diagram
    if (!model || !drawing || !build) return
    event.preventDefault()
    const position = flow.screenToFlowCoordinate({ x: event.clientX, y: event.clientY })
    const from = bayAt(drawing, build, position)
    const count = Number(event.dataTransfer?.getData('application/x-bayloom-count')) || 1
    diagram.commit(addParts(build, diagram.makeId, model, { count, position, ...(from && { from }) }))
  }
}
