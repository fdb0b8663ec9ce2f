import { shallowRef } from 'vue'
import type { JointEnd } from '#shared/build/document.ts'
import { connect, findConnector } from '#shared/build/edits/connect.ts'
import { canJoin } from '#shared/build/edits/free.ts'
import { freeMates } from '#shared/build/edits/mates.ts'
import { connectorName } from '#shared/build/edits/words.ts'
import { useDiagramStore } from '../stores/diagram.ts'
import { connectorKey } from '../stores/selection.ts'

/** A run that is being drawn from a connector. */
export interface Linking {
  from: JointEnd
  /** Where it starts, and where the pointer is, in places of the sheet. */
  start: { x: number; y: number }
  end: { x: number; y: number }
  side: 'left' | 'right'
}

const none: ReadonlySet<string> = new Set()

/** Drawing a run from connector to connector: what can mate is lit, and what cannot says why. */
export function useLinking() {
  const diagram = useDiagramStore()
  const linking = shallowRef<Linking | null>(null)
  /** Connectors that the run may end at, as `part/connector`. */
  const mates = shallowRef(none)
  /** What the connector under the pointer says. */
  const verdict = shallowRef<{ ok: boolean; text: string } | null>(null)

  function begin(from: JointEnd, start: { x: number; y: number }, side: 'left' | 'right'): void {
    const { build } = diagram
    const connector = build && findConnector(build, from)
    if (!build || !connector) return
    mates.value = new Set(
      freeMates(build, connector).map((to) => connectorKey({ part: to.part.part.id, connector: to.connector.id })),
    )
    linking.value = { from, start, end: start, side }
    verdict.value = null
  }

  function move(end: { x: number; y: number }, over: JointEnd | null): void {
    if (!linking.value) return
    linking.value = { ...linking.value, end }
    verdict.value = over ? judge(linking.value.from, over) : null
  }

  function judge(from: JointEnd, to: JointEnd): { ok: boolean; text: string } | null {
    const { build } = diagram
    const a = build && findConnector(build, from)
    const b = build && findConnector(build, to)
    if (!a || !b || a === b) return null
    const joined = canJoin(a, b)
    return joined.ok
      ? { ok: true, text: `Connect ${connectorName(a)} to ${connectorName(b)}` }
      : { ok: false, text: joined.reason ?? 'They do not mate.' }
  }

  function end(to: JointEnd | null): void {
    const { build } = diagram
    const started = linking.value
    cancel()
    if (build && started && to && connectorKey(to) !== connectorKey(started.from))
      diagram.commit(connect(build, diagram.makeId, started.from, to))
  }

  function cancel(): void {
    linking.value = null
    mates.value = none
    verdict.value = null
  }

  return { linking, mates, verdict, begin, move, end, cancel }
}

export type LinkingState = ReturnType<typeof useLinking>
