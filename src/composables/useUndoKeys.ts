import { useEventListener } from '@vueuse/core'
import { useDiagramStore } from '../stores/diagram.ts'

const isTyping = (target: EventTarget | null): boolean =>
  target instanceof HTMLElement && target.closest('input, textarea, select, [contenteditable], [role=dialog]') !== null

/** Undo and redo by their usual keys anywhere on the page, but in fields, which have an undo of their own. */
export function useUndoKeys(): void {
  const diagram = useDiagramStore()
  useEventListener(window, 'keydown', (event) => {
    if (!(event.ctrlKey || event.metaKey) || event.altKey || isTyping(event.target)) return
    const key = event.key.toLowerCase()
    if (key === 'z' && !event.shiftKey) diagram.undo()
    else if (key === 'y' || (key === 'z' && event.shiftKey)) diagram.redo()
    else return
    event.preventDefault()
  })
}
