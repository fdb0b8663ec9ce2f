import type { BuildDocument, Purchase } from '../document.ts'
import { same } from '../same.ts'
import { outcome, refuse, type EditOutcome } from './outcome.ts'

/** Fields of a note about buying, `null` to clear one. */
export type PurchasePatch = { [Field in keyof Omit<Purchase, 'line'>]?: Purchase[Field] | null }

/** Notes about buying for several lines in one edit. What is left empty is not kept. */
export function notePurchases(
  document: BuildDocument,
  patches: readonly { line: string; name: string; patch: PurchasePatch }[],
): EditOutcome {
  const changes = patches.flatMap(({ line, patch }) => {
    const { line: _line, ...before } = document.purchases?.find((one) => one.line === line) ?? { line }
    const next = Object.fromEntries(Object.entries({ ...before, ...patch }).filter(([, value]) => value != null))
    if (same(before, next)) return []
    return [{ op: 'setPurchase' as const, line, purchase: Object.keys(next).length === 0 ? null : next }]
  })
  if (changes.length === 0) return refuse('Nothing would change.')
  const [first] = patches
  const label =
    patches.length === 1 && first ? `Note on buying ${first.name}` : `Notes on buying ${changes.length} lines`
  return outcome(label.slice(0, 200), changes)
}
