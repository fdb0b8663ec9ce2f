import { createHash } from 'node:crypto'

/** Hash of a document's content: the same for the same fields and values, in whatever order the fields stand. */
export const contentHash = (document: unknown): string =>
  createHash('sha256').update(ordered(document)).digest('base64url')

/** JSON with the fields of every object in the order of their names. */
function ordered(value: unknown): string {
  if (typeof value !== 'object' || value === null) return JSON.stringify(value)
  if (Array.isArray(value)) return `[${value.map(ordered).join(',')}]`
  const fields = value as Record<string, unknown>
  let text = ''
  for (const name of Object.keys(fields).sort()) {
    const field = fields[name]
    if (field !== undefined) text += `${text === '' ? '' : ','}${JSON.stringify(name)}:${ordered(field)}`
  }
  return `{${text}}`
}
