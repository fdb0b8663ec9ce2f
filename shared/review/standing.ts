import type { ReviewRules, Round, VerdictKind } from '../contract/rounds.ts'

/** What decides where a round stands. */
export interface RoundFacts {
  state: Round['state']
  rules: ReviewRules
  stops: Round['stops']
  verdicts: readonly { verdict: VerdictKind; guest: boolean }[]
  lapsedRevision: number | null
}

/** Verdicts that count by the rules: those of guests only where the owners let them. */
const counting = ({ rules, verdicts }: RoundFacts) => verdicts.filter(({ guest }) => rules.guestsCount || !guest)

/** How many approvals count towards what is needed. */
export const approvalsOf = (round: RoundFacts): number =>
  counting(round).filter(({ verdict }) => verdict === 'approve').length

/** Whether a rule of the owners forbids an approval of this revision, however many approve. */
export function isHeldBack({ rules, stops }: Pick<RoundFacts, 'rules' | 'stops'>): boolean {
  if (rules.heldBackBy === 'none') return false
  if (stops === null) return true
  return stops.danger > 0 || (rules.heldBackBy === 'fault' && stops.fault > 0)
}

/** Where a round stands. One request for changes outweighs every approval. */
export function standingOf(round: RoundFacts): Round['standing'] {
  if (round.state === 'withdrawn') return 'withdrawn'
  if (counting(round).some(({ verdict }) => verdict === 'ask-for-changes')) return 'changes asked'
  if (approvalsOf(round) < round.rules.approvals) return 'waiting'
  if (isHeldBack(round)) return 'held back'
  return round.lapsedRevision === null ? 'approved' : 'lapsed'
}
