import { computed } from 'vue'
import { aboutOf } from '#shared/comments/about.ts'
import type { Pin } from '#shared/contract/comments.ts'
import { useCanvasStore } from '../stores/canvas.ts'
import { useCommentsStore, wholeBuild, type CommentTarget } from '../stores/comments.ts'
import { useDiagramStore } from '../stores/diagram.ts'
import { useSelectionStore } from '../stores/selection.ts'

/** What the next comment is about: what was asked for, else what is chosen on the sheet, else the build. */
export function useCommentTarget() {
  const diagram = useDiagramStore()
  const selection = useSelectionStore()
  const comments = useCommentsStore()
  const canvas = useCanvasStore()

  const chosen = computed<Pin | null>(() => {
    const { connector, onlyPart, onlyJoint } = selection
    if (connector && connector.part === onlyPart) return { kind: 'connector', ...connector }
    if (onlyPart !== undefined) return { kind: 'part', part: onlyPart }
    return onlyJoint === undefined ? null : { kind: 'joint', joint: onlyJoint }
  })
  const target = computed<CommentTarget>(() => {
    if (comments.target) return comments.target
    const about = chosen.value && diagram.document && aboutOf(chosen.value, diagram.document)
    return chosen.value && about ? { pin: chosen.value, about } : wholeBuild
  })

  /** Waits for a click on the sheet, or takes the middle of what is in view. */
  function placeSpot(middle = false): void {
    const at = middle ? canvas.acts?.middle() : undefined
    if (at) comments.commentOn({ kind: 'spot', x: Math.round(at.x), y: Math.round(at.y) }, 'a spot on the sheet')
    else comments.placing = true
  }

  return { chosen, target, isSpot: computed(() => target.value.pin.kind === 'spot'), placeSpot }
}
