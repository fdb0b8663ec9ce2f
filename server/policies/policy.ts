import type { BuildRole } from '#shared/contract/build.ts'
import type { User } from '#shared/contract/session.ts'

/** Who asks. Null: nobody is signed in. */
export type Actor = User | null

/** What a link lets its guests do. */
export type GuestRight = 'read' | 'review'

/** What the question is about, as far as a policy needs to know. */
export interface Target {
  /** Role of the actor in the build; null: none, or no such build. */
  buildRole?: BuildRole | null
  /** What the guest's link into this very build allows; null: no guest of it. */
  guest?: GuestRight | null
  /** The person acted upon is the actor. */
  self?: boolean
}

/**
 * `hide`: answered as if it did not exist, so that nobody learns which builds there are.
 */
export type Verdict = 'allow' | 'sign-in' | 'forbid' | 'hide'

/** What may be asked for. `build` policies need `buildRole`. */
export const policies = {
  anybody: 'everybody, signed in or not',
  'signed-in': 'everybody who is signed in',
  'administer-installation': 'administrators',
  'edit-catalog': 'catalog editors and administrators',
  'see-build': 'people of the build, from reader up, and guests of its links',
  'comment-on-build': 'owners, editors and reviewers of the build, and guests of its review links',
  'read-build': 'people of the build, from reader up',
  'edit-build': 'owners and editors of the build',
  'own-build': 'owners of the build',
  'remove-member': 'owners of the build, and everybody for themselves',
} as const
export type PolicyName = keyof typeof policies

const buildPolicies: ReadonlySet<PolicyName> = new Set([
  'see-build',
  'comment-on-build',
  'read-build',
  'edit-build',
  'own-build',
  'remove-member',
])

/** Policies that let guests of a link through. */
const guestPolicies: ReadonlySet<PolicyName> = new Set(['see-build', 'comment-on-build'])

/** Whether a policy asks for the actor's role in a build. */
export const concernsBuild = (policy: PolicyName): boolean => buildPolicies.has(policy)

/** Whether a policy may let through somebody who came by a link. */
export const concernsGuests = (policy: PolicyName): boolean => guestPolicies.has(policy)

/** The one place that answers "may this person do this to that". An administrator has no way into others' builds. */
export function may(actor: Actor, policy: PolicyName, target: Target = {}): Verdict {
  if (policy === 'anybody') return 'allow'
  if (target.guest && !target.buildRole && concernsGuests(policy))
    return policy === 'see-build' || target.guest === 'review' ? 'allow' : 'forbid'
  if (!actor) return 'sign-in'
  switch (policy) {
    case 'signed-in':
      return 'allow'
    case 'administer-installation':
      return actor.role === 'administrator' ? 'allow' : 'forbid'
    case 'edit-catalog':
      return actor.role === 'administrator' || actor.role === 'catalog-editor' ? 'allow' : 'forbid'
  }
  const role = target.buildRole ?? null
  if (!role) return 'hide'
  switch (policy) {
    case 'see-build':
    case 'read-build':
      return 'allow'
    case 'comment-on-build':
      return role === 'reader' ? 'forbid' : 'allow'
    case 'edit-build':
      return role === 'owner' || role === 'editor' ? 'allow' : 'forbid'
    case 'own-build':
      return role === 'owner' ? 'allow' : 'forbid'
    case 'remove-member':
      return role === 'owner' || target.self === true ? 'allow' : 'forbid'
  }
}
