import type { Edit } from '#shared/build/changes.ts'

/** What the server says when two people changed the same thing. */
export interface Conflict {
  revision: number
  theirs: Edit[]
  clashes: string[]
  document: unknown
}

export type FailureKind =
  /** No answer: the connection or the server is away. Tried again. */
  | 'offline'
  /** The session has ended. Tried again after signing in. */
  | 'session'
  | 'conflict'
  /** The server will never take these edits. */
  | 'refused'

/** Why a save was not acknowledged. */
export class SaveFailure extends Error {
  readonly kind: FailureKind
  readonly conflict: Conflict | null
  constructor(kind: FailureKind, message: string, conflict: Conflict | null = null) {
    super(message)
    this.name = 'SaveFailure'
    this.kind = kind
    this.conflict = conflict
  }
}
