import { computed } from 'vue'
import { useRoute, useRouter } from 'vue-router'
import { aboutOf } from '#shared/comments/about.ts'
import type { Thread } from '#shared/contract/comments.ts'
import { ledgerKey } from '../diagram/ledgerRows.ts'
import { useChecksStore } from '../stores/checks.ts'
import { useCommentsStore } from '../stores/comments.ts'
import { useDiagramStore } from '../stores/diagram.ts'
import { useSelectionStore } from '../stores/selection.ts'

/** What a thread is about now: its words, how to show it, and what became of it. */
export interface CommentSubject {
  about: string
  show?: () => unknown
  /** Why there is nothing to show. */
  gone?: string
}

export function useCommentSubject(thread: () => Thread) {
  const diagram = useDiagramStore()
  const selection = useSelectionStore()
  const checks = useChecksStore()
  const comments = useCommentsStore()
  const route = useRoute()
  const router = useRouter()

  function showPart(id: string, connector?: string): void {
    selection.choose({ parts: [id], connector: connector === undefined ? null : { part: id, connector } })
    selection.reveal([id], [], true)
  }

  function goneWords({ about, goneIn }: Thread): string {
    return goneIn === null
      ? `${about} is not in what you see: it was removed since.`
      : `${about} was removed in revision ${goneIn}.`
  }

  return computed<CommentSubject>(() => {
    const { pin, about, revision } = thread()
    const { document } = diagram
    if (!document) return { about }
    // The designation of today, where it was changed since.
    const now = aboutOf(pin, document) ?? about
    switch (pin.kind) {
      case 'build':
        return { about: 'The build' }
      case 'part':
      case 'connector': {
        const there = document.parts.some(({ id }) => id === pin.part)
        if (!there) return { about, gone: goneWords(thread()) }
        return { about: now, show: () => showPart(pin.part, pin.kind === 'connector' ? pin.connector : undefined) }
      }
      case 'joint': {
        if (!document.joints.some(({ id }) => id === pin.joint)) return { about, gone: goneWords(thread()) }
        return {
          about: now,
          show: () => {
            selection.choose({ joints: [pin.joint] })
            selection.reveal([], [pin.joint], true)
          },
        }
      }
      case 'finding': {
        const finding = checks.result?.findings.find(({ key }) => key === pin.key)
        if (finding) return { about, show: () => selection.light(finding.subjects) }
        return checks.result
          ? { about, gone: `The checker no longer finds this, as it did at revision ${revision}.` }
          : { about }
      }
      case 'ledger': {
        const row = checks.result?.ledger.find((one) => ledgerKey(one) === pin.key)
        if (row) return { about, show: () => selection.light([row.subject]) }
        return checks.result ? { about, gone: 'The ledger no longer has this row.' } : { about }
      }
      case 'spot':
        return { about, show: () => (comments.spot = { x: pin.x, y: pin.y }) }
      case 'lid-line':
        return { about, show: () => router.push({ query: { ...route.query, show: 'lid' } }) }
    }
  })
}
