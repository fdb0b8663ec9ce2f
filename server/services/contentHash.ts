import { createHash } from 'node:crypto'

/** Hash of a document's content: the same for the same fields and values, in whatever order the fields stand. */
export const contentHash = (document: unknown): string =>
  createHash('sha256').update(JSON.stringify(document, sortFields)).digest('base64url')

function sortFields(_field: string, value: unknown): unknown {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return value
  return Object.fromEntries(Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1)))
}
