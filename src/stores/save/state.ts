import type { Conflict } from './failure.ts'

/** How the open build stands with the server. */
export type SaveState =
  | { kind: 'saved'; revision: number }
  | { kind: 'saving'; revision: number }
  | { kind: 'offline'; revision: number; unsaved: number }
  | { kind: 'session'; revision: number; unsaved: number }
  | { kind: 'conflict'; revision: number; unsaved: number; conflict: Conflict }
  | { kind: 'refused'; revision: number; unsaved: number; reason: string }

/** The state in words, as it stands in the bar. */
export function saveWords(state: SaveState): string {
  switch (state.kind) {
    case 'saved':
      return `saved, revision ${state.revision}`
    case 'saving':
      return 'saving'
    case 'offline':
      return 'not saved: no connection, kept on this computer'
    case 'session':
      return 'not saved: signed out, kept on this computer'
    case 'conflict':
      return 'not saved: somebody changed the same parts'
    case 'refused':
      return `not saved: ${state.reason}`
  }
}
