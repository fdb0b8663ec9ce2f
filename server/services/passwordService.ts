import argon2 from 'argon2'
import { passwordWeakness } from './commonPasswords.ts'
import { makeToken } from './tokens.ts'
import { Refusal } from './refusal.ts'

/**
 * Argon2id at the library's current advice (64 MiB, 3 passes, 4 lanes), which is the second recommended option
 * of RFC 9106, section 4.
 */
export const hashPassword = (password: string): Promise<string> => argon2.hash(password, { type: argon2.argon2id })

let decoy: Promise<string> | undefined

/** Compares a password with a hash. Without a hash (no such account) it takes the same time and says no. */
export async function verifyPassword(hash: string | null, password: string): Promise<boolean> {
  decoy ??= hashPassword(makeToken())
  const matches = await argon2.verify(hash ?? (await decoy), password)
  return hash !== null && matches
}

/** Whether a hash was made with weaker settings than today's. */
export const isOutdated = (hash: string): boolean => argon2.needsRehash(hash)

/** Refuses a new password that is easily guessed. `field` is its place in the request. */
export function refuseWeakPassword(password: string, email: string, name: string, field: string): void {
  const weakness = passwordWeakness(password, email, name)
  if (weakness === null) return
  throw new Refusal('bad-input', { errors: [{ path: field, message: `${weakness}: choose another` }] })
}
