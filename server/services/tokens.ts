import { createHash, createHmac, randomBytes, timingSafeEqual } from 'node:crypto'

/** A secret for a link or cookie: 256 random bits. */
export const makeToken = (): string => randomBytes(32).toString('base64url')

/** What the database keeps of a token. Tokens are random and long, so a plain hash is enough. */
export const hashToken = (token: string): string => createHash('sha256').update(token).digest('base64url')

/** A keyed tag for a text, as a string. */
export const tag = (key: string, text: string): string => createHmac('sha256', key).update(text).digest('base64url')

/** Compares two texts in a time that does not depend on where they differ. */
export function sameText(a: string, b: string): boolean {
  const left = createHash('sha256').update(a).digest()
  const right = createHash('sha256').update(b).digest()
  return timingSafeEqual(left, right)
}
