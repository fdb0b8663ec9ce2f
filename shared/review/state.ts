import type { ReviewState } from '../contract/reviewState.ts'
import type { Round } from '../contract/rounds.ts'

/** How a build stands with its reviewers, from its rounds, newest first. */
export function reviewStateOf(rounds: readonly Round[]): ReviewState {
  const approved = rounds.find(({ standing }) => standing === 'approved' || standing === 'lapsed')
  const open = rounds.find(({ state }) => state === 'open')
  return {
    approval: approved
      ? {
          round: approved.number,
          revision: approved.revision,
          by: approved.verdicts
            .filter(({ verdict }) => verdict === 'approve')
            .map(({ by }) => ({ name: by.kind === 'former' ? 'former member' : by.name, guest: by.kind === 'guest' })),
          at: approved.verdicts.at(-1)?.givenAt ?? approved.askedAt,
          lapsedRevision: approved.lapsedRevision,
        }
      : null,
    open:
      open && open !== approved
        ? { round: open.number, revision: open.revision, changesAsked: open.standing === 'changes asked' }
        : null,
  }
}
