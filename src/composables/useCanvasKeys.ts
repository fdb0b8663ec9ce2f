import { duplicateParts } from '#shared/build/edits/duplicate.ts'
import { removeChosen } from '#shared/build/edits/remove.ts'
import { moveParts } from '#shared/build/edits/revise.ts'
import { connectorName, count } from '#shared/build/edits/words.ts'
import { isFree } from '#shared/build/edits/free.ts'
import type { ResolvedPart } from '#shared/build/resolve.ts'
import { titleOf } from '../diagram/face.ts'
import { neighbourOf, type Direction } from '../diagram/neighbours.ts'
import { useCanvasStore } from '../stores/canvas.ts'
import { useChecksStore } from '../stores/checks.ts'
import { useCommentsStore } from '../stores/comments.ts'
import { useDiagramStore } from '../stores/diagram.ts'
import { useSelectionStore } from '../stores/selection.ts'
import { useCommentTarget } from './useCommentTarget.ts'

const arrows: Readonly<Record<string, Direction>> = {
  ArrowLeft: 'left',
  ArrowRight: 'right',
  ArrowUp: 'up',
  ArrowDown: 'down',
}
const steps: Readonly<Record<Direction, { x: number; y: number }>> = {
  left: { x: -8, y: 0 },
  right: { x: 8, y: 0 },
  up: { x: 0, y: -8 },
  down: { x: 0, y: 8 },
}

/** Everything that the canvas does from the keyboard. Keys act only while the canvas has the focus. */
export function useCanvasKeys(cancel: () => void) {
  const diagram = useDiagramStore()
  const selection = useSelectionStore()
  const canvas = useCanvasStore()
  const checks = useChecksStore()
  const comments = useCommentsStore()
  const { target } = useCommentTarget()
  let nudge = 0

  function onKeydown(event: KeyboardEvent): void {
    if (event.defaultPrevented) return
    const command = event.ctrlKey || event.metaKey
    const done = command ? withCommand(event) : plain(event)
    if (done) {
      event.preventDefault()
      event.stopPropagation()
    }
  }

  function withCommand(event: KeyboardEvent): boolean {
    switch (event.key.toLowerCase()) {
      case 'a':
        selection.choose({ parts: diagram.document?.parts.map((part) => part.id) ?? [] })
        return true
      case 'd':
        return duplicate()
      default:
        return false
    }
  }

  function plain(event: KeyboardEvent): boolean {
    const direction = arrows[event.key]
    if (direction) return event.shiftKey ? move(direction) : walk(direction)
    switch (event.key) {
      case 'Escape':
        cancel()
        selection.clear()
        return true
      case 'Delete':
      case 'Backspace':
        return remove()
      case ']':
      case '[':
        return stepConnector(event.key === ']' ? 1 : -1)
      case 'c':
        return open('connect', selection.onlyPart !== undefined)
      case 'o':
        return open('outlets', selection.onlyPart !== undefined)
      case 'd':
        return open('duplicate', selection.parts.size > 0)
      case '?':
        return open('keys', true)
      case '+':
      case '=':
        canvas.acts?.zoomBy(1.25)
        return true
      case '-':
        canvas.acts?.zoomBy(0.8)
        return true
      case 'f':
        canvas.acts?.fit()
        return true
      case 'm':
        return nextMoment()
      case 'n':
        return comment()
      default:
        return false
    }
  }

  function open(dialog: NonNullable<typeof canvas.dialog>, isPossible: boolean): boolean {
    if (isPossible) canvas.dialog = dialog
    else diagram.say('Choose a part first.', 'refusal')
    return true
  }

  function walk(direction: Direction): boolean {
    const { drawing, build } = diagram
    if (!drawing || !build) return false
    const from = drawing.nodes.find((node) => node.id === canvas.current)
    const to = neighbourOf(drawing.nodes, from, direction)
    if (!to) return true
    canvas.current = to.id
    selection.choose({ parts: [to.part] })
    selection.reveal([to.part])
    const part = build.partById.get(to.part)
    if (part) diagram.say(describe(part), 'quiet')
    return true
  }

  function describe(part: ResolvedPart): string {
    const free = part.connectors.filter(isFree).length
    const bay = part.part.bay ? `, bay ${part.part.bay.slot}` : ''
    const worst = checks.byPart.get(part.part.id)?.[0]
    return `${part.part.ref}, ${titleOf(part)}${bay}, ${count(free, 'free connector')}${worst ? `, ${worst.severity}: ${worst.message}` : ''}`
  }

  function stepConnector(step: number): boolean {
    const part = selection.onlyPart === undefined ? undefined : diagram.build?.partById.get(selection.onlyPart)
    if (!part || part.connectors.length === 0) return true
    const at = part.connectors.findIndex((one) => one.connector.id === selection.connector?.connector)
    const size = part.connectors.length
    const next = part.connectors[at < 0 ? (step > 0 ? 0 : size - 1) : (at + step + size) % size]
    if (!next) return true
    selection.choose({ parts: [part.part.id], connector: { part: part.part.id, connector: next.connector.id } })
    const others = next.joints.map((joint) => connectorName(joint.a === next ? joint.b : joint.a))
    diagram.say(
      `${connectorName(next)}, ${next.type.name}, ${others.length > 0 ? `joined to ${others.join(' and ')}` : 'free'}`,
      'quiet',
    )
    return true
  }

  function move(direction: Direction): boolean {
    const { drawing, document } = diagram
    if (!drawing || !document) return false
    const by = steps[direction]
    const places = new Map(
      drawing.nodes
        .filter((node) => selection.parts.has(node.part) && (node.kind === 'part' || node.kind === 'case'))
        .map((node) => [node.part, { x: node.x + by.x, y: node.y + by.y }]),
    )
    if (places.size === 0) return true
    const key = [...places.keys()].join()
    diagram.commit(moveParts(document, places), `nudge ${nudge} ${key}`)
    return true
  }

  function remove(): boolean {
    if (!diagram.build || selection.isEmpty) return true
    if (diagram.commit(removeChosen(diagram.build, selection.parts, selection.joints))) selection.clear()
    return true
  }

  function duplicate(): boolean {
    if (!diagram.build || selection.parts.size === 0) return true
    diagram.commit(duplicateParts(diagram.build, diagram.makeId, selection.parts))
    return true
  }

  function comment(): boolean {
    const { pin, about } = target.value
    comments.commentOn(pin, about)
    return true
  }

  function nextMoment(): boolean {
    const at = checks.moments.findIndex((one) => one.moment === checks.shown?.moment)
    const next = checks.moments[(at + 1) % Math.max(1, checks.moments.length)]
    if (next) {
      checks.moment = next.moment
      diagram.say(`Moment: ${next.label}`, 'quiet')
    }
    return true
  }

  /** A pause between two nudges makes them two steps of undo. */
  const onKeyup = (event: KeyboardEvent): void => {
    if (event.key === 'Shift') nudge++
  }

  return { onKeydown, onKeyup }
}
