import type { Edit } from '#shared/build/changes.ts'
import type { BuildDocument } from '#shared/build/document.ts'

/** Edits on their way to the server. The id stays the same until an answer arrives, however often they are sent. */
export interface Sending {
  requestId: string
  edits: Edit[]
}

/** Unsaved work of one tab on one build: enough to go on after a reload, without the server. */
export interface Draft {
  /** One a tab and build. */
  key: string
  buildId: string
  /** Revision that `baseDocument` is. */
  base: number
  baseDocument: BuildDocument
  sending: Sending | null
  waiting: Edit[]
  savedAt: number
}

/** Where drafts are kept on this computer. Writes are carried out in the order in which they are asked for. */
export interface DraftStore {
  put(draft: Draft): Promise<void>
  remove(key: string): Promise<void>
  list(buildId: string): Promise<Draft[]>
}
