import type { MakeId } from '#shared/build/edits/outcome.ts'

const letters = 'abcdefghijkmnpqrstuvwxyz23456789'

/** Ten random letters: two people who add parts at the same time never give the same id. */
export const makeId: MakeId = (prefix) => {
  const bytes = crypto.getRandomValues(new Uint8Array(10))
  return prefix + [...bytes].map((byte) => letters[byte % letters.length]).join('')
}
