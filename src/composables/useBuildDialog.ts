import { computed } from 'vue'
import { useCanvasStore } from '../stores/canvas.ts'

type Name = NonNullable<ReturnType<typeof useCanvasStore>['dialog']>

/** Whether one dialog is the one that is asked for; setting it false puts it away. */
export function useBuildDialog(name: Name) {
  const canvas = useCanvasStore()
  return computed({
    get: () => canvas.dialog === name,
    set: (open) => {
      if (open) canvas.dialog = name
      else if (canvas.dialog === name) canvas.dialog = null
    },
  })
}
