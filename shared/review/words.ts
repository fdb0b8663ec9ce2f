import { counted, listed } from '../check/words.ts'
import type { Approval, ReviewState } from '../contract/reviewState.ts'
import type { ReviewRules, Round, VerdictKind } from '../contract/rounds.ts'
import { approvalsOf, type RoundFacts } from './standing.ts'

/** "Approved at revision 12 by Noor Castellan and Jo (guest)"; once the diagram moved on, that it lapsed, and where. */
export function approvalWords({ revision, by, lapsedRevision }: Approval): string {
  const names = listed(by.map(({ name, guest }) => (guest ? `${name} (guest)` : name)))
  const approved = `pproved at revision ${revision}${names === '' ? '' : ` by ${names}`}`
  return lapsedRevision === null ? `A${approved}` : `Approval lapsed at revision ${lapsedRevision}: a${approved}`
}

/** As `approvalWords`, for narrow places. */
export const approvalShort = ({ revision, lapsedRevision }: Approval): string =>
  lapsedRevision === null ? `approved at revision ${revision}` : `approval of revision ${revision} lapsed`

/**
 * What an approval means on a sheet that shows some revision: nothing on one that is older than what was approved, and not
 * lapsed on one from before it lapsed.
 */
export function approvalAt(review: ReviewState | null, revision: number): Approval | null {
  const approval = review?.approval ?? null
  if (!approval || !(revision >= approval.revision)) return null
  return revision < (approval.lapsedRevision ?? Infinity) ? { ...approval, lapsedRevision: null } : approval
}

/** The state of review in the title block of a paper that shows a revision. */
export function checkedWords(review: ReviewState | null, revision: number): string {
  const approval = approvalAt(review, revision)
  if (approval) return approvalShort(approval)
  return review?.open?.revision === revision ? `in review, round ${review.open.round}` : 'not reviewed'
}

/** How a build stands with its reviewers, in few words; empty where nobody was asked. */
export function reviewWords({ approval, open }: ReviewState): string {
  const asked = open
    ? `${open.changesAsked ? 'changes asked' : 'in review'}, round ${open.round}, revision ${open.revision}`
    : ''
  return [approval ? approvalShort(approval) : '', asked].filter(Boolean).join('; ')
}

const facts = (round: Round): RoundFacts => ({
  ...round,
  verdicts: round.verdicts.map(({ verdict, by }) => ({ verdict, guest: by.kind === 'guest' })),
})

/** Where a round stands, in a sentence. */
export function standingWords(round: Round): string {
  const { standing, revision, rules, stops, state } = round
  const approvals = approvalsOf(facts(round))
  const count = `${approvals} of ${counted(rules.approvals, 'approval')}`
  switch (standing) {
    case 'waiting':
      return state === 'open' ? `Waiting for verdicts: ${count} so far.` : `Closed with ${count}: nothing is approved.`
    case 'changes asked':
      return state === 'open'
        ? 'Changes are asked for. The next round will show what became of them.'
        : 'Ended with changes asked for.'
    case 'held back':
      return stops === null
        ? `${count}, but the revision could not be checked, and the rules of this build ask for that.`
        : `${count}, but held back: revision ${revision} has ${stopWords(stops)}, and the rules of this build do not let that pass.`
    case 'approved':
      return `Revision ${revision} is approved.`
    case 'lapsed':
      return `Revision ${revision} was approved. The approval lapsed at revision ${round.lapsedRevision ?? ''}, which changed the plan.`
    case 'withdrawn':
      return 'Withdrawn: it counts for nothing.'
  }
}

const stopWords = ({ danger, fault }: { danger: number; fault: number }): string =>
  [danger > 0 ? counted(danger, 'open danger') : '', fault > 0 ? counted(fault, 'open fault') : '']
    .filter(Boolean)
    .join(' and ')

/** What an approval needs, in a sentence. */
export function rulesWords({ approvals, heldBackBy, guestsCount }: ReviewRules): string {
  const held = {
    none: '',
    danger: ' and no open danger',
    fault: ' and no open danger or fault',
  }[heldBackBy]
  const guests = guestsCount ? '' : ' Verdicts of guests are shown, but do not count.'
  return `An approval needs ${counted(approvals, 'approving verdict')}${held}.${guests}`
}

export const verdictWords: Readonly<Record<VerdictKind, string>> = {
  approve: 'approves',
  'ask-for-changes': 'asks for changes',
}
