import type { Edit } from '../build/changes.ts'
import type { BuildDocument } from '../build/document.ts'

/**
 * The edit that lets the automatic arrangement place parts again: all of them, or those named. Null where nobody
 * moved any of them.
 */
export function tidy(document: BuildDocument, only?: ReadonlySet<string>): Edit | null {
  const moved = document.parts.filter(
    ({ id, position }) => position !== undefined && (only === undefined || only.has(id)),
  )
  if (moved.length === 0) return null
  return {
    label: moved.length === 1 ? `Tidy ${moved[0]?.ref ?? ''}` : `Tidy ${moved.length} parts`,
    changes: moved.map(({ id }) => ({ op: 'updatePart', id, patch: { position: null } })),
  }
}
