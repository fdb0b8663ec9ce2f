import { describe, expect, test } from 'vitest'
import type { Round } from '#shared/contract/rounds.ts'
import { approvalsOf, isHeldBack, standingOf, type RoundFacts } from '#shared/review/standing.ts'
import {
  approvalAt,
  approvalWords,
  checkedWords,
  reviewWords,
  rulesWords,
  standingWords,
} from '#shared/review/words.ts'

const facts = (more: Partial<RoundFacts> = {}): RoundFacts => ({
  state: 'open',
  rules: { approvals: 1, heldBackBy: 'none', guestsCount: true },
  stops: { danger: 0, fault: 0 },
  verdicts: [],
  lapsedRevision: null,
  ...more,
})
const yes = { verdict: 'approve', guest: false } as const
const no = { verdict: 'ask-for-changes', guest: false } as const
const guestYes = { verdict: 'approve', guest: true } as const
const guestNo = { verdict: 'ask-for-changes', guest: true } as const

test.each([
  ['nobody has said anything', {}, 'waiting'],
  ['one approves', { verdicts: [yes] }, 'approved'],
  [
    'one of two approves',
    { verdicts: [yes], rules: { approvals: 2, heldBackBy: 'none', guestsCount: true } },
    'waiting',
  ],
  [
    'both approve',
    { verdicts: [yes, guestYes], rules: { approvals: 2, heldBackBy: 'none', guestsCount: true } },
    'approved',
  ],
  ['many approve and one asks for changes', { verdicts: [yes, yes, no] }, 'changes asked'],
  [
    'guests do not count',
    { verdicts: [guestYes, guestNo], rules: { approvals: 1, heldBackBy: 'none', guestsCount: false } },
    'waiting',
  ],
  ['the diagram moved on', { verdicts: [yes], lapsedRevision: 4 }, 'lapsed'],
  ['it was withdrawn', { verdicts: [yes], state: 'withdrawn' }, 'withdrawn'],
  ['it was closed after it was approved', { verdicts: [yes], state: 'closed' }, 'approved'],
] as const)('a round where %s is %j: %s', (_what, more, standing) => {
  expect(standingOf(facts(more as Partial<RoundFacts>))).toBe(standing)
})

describe('a rule on findings', () => {
  const held = (heldBackBy: 'none' | 'danger' | 'fault', stops: RoundFacts['stops']) =>
    isHeldBack({ rules: { approvals: 1, heldBackBy, guestsCount: true }, stops })

  test('lets pass what it does not name', () => {
    expect(held('none', { danger: 3, fault: 3 })).toBe(false)
    expect(held('danger', { danger: 0, fault: 3 })).toBe(false)
    expect(held('fault', { danger: 0, fault: 0 })).toBe(false)
  })

  test('holds back at the first one, and where the checker could not say', () => {
    expect(held('danger', { danger: 1, fault: 0 })).toBe(true)
    expect(held('fault', { danger: 0, fault: 1 })).toBe(true)
    expect(held('fault', { danger: 1, fault: 0 })).toBe(true)
    expect(held('danger', null)).toBe(true)
    expect(held('none', null)).toBe(false)
  })

  test('holds an approved round back', () => {
    const round = facts({
      verdicts: [yes],
      stops: { danger: 1, fault: 0 },
      rules: { approvals: 1, heldBackBy: 'danger', guestsCount: true },
    })
    expect(standingOf(round)).toBe('held back')
    expect(approvalsOf(round)).toBe(1)
  })
})

describe('in words', () => {
  const approval = {
    round: 2,
    revision: 12,
    by: [
      { name: 'Noor', guest: false },
      { name: 'Jo', guest: true },
    ],
    at: '2026-05-02T10:00:00.000Z',
    lapsedRevision: null,
  }

  test('an approval names its revision and who gave it, and where it lapsed', () => {
    expect(approvalWords(approval)).toBe('Approved at revision 12 by Noor and Jo (guest)')
    expect(approvalWords({ ...approval, lapsedRevision: 15 })).toBe(
      'Approval lapsed at revision 15: approved at revision 12 by Noor and Jo (guest)',
    )
    expect(reviewWords({ approval: null, open: null })).toBe('')
    expect(
      reviewWords({
        approval: { ...approval, lapsedRevision: 15 },
        open: { round: 3, revision: 15, changesAsked: true },
      }),
    ).toBe('approval of revision 12 lapsed; changes asked, round 3, revision 15')
  })

  test('a paper says what holds for the revision that it shows', () => {
    const lapsed = { approval: { ...approval, lapsedRevision: 15 }, open: null }
    expect(checkedWords(null, 12)).toBe('not reviewed')
    expect(checkedWords({ approval: null, open: { round: 1, revision: 3, changesAsked: false } }, 3)).toBe(
      'in review, round 1',
    )
    expect(checkedWords({ approval, open: null }, 13)).toBe('approved at revision 12')
    expect(approvalAt(lapsed, 14)).toMatchObject({ revision: 12, lapsedRevision: null })
    expect(approvalAt(lapsed, 15)).toEqual(lapsed.approval)
    expect(approvalAt(lapsed, 11)).toBeNull()
    expect(checkedWords(lapsed, 12)).toBe('approved at revision 12')
    expect(checkedWords(lapsed, 14)).toBe('approved at revision 12')
    expect(checkedWords(lapsed, 15)).toBe('approval of revision 12 lapsed')
    expect(checkedWords({ approval, open: null }, 11)).toBe('not reviewed')
  })

  test('a round and its rules', () => {
    const round = {
      ...facts(),
      verdicts: [],
      standing: 'held back',
      revision: 7,
      stops: { danger: 1, fault: 2 },
      rules: { approvals: 2, heldBackBy: 'fault', guestsCount: false },
    } as unknown as Round
    expect(standingWords(round)).toBe(
      '0 of 2 approvals, but held back: revision 7 has 1 open danger and 2 open faults, and the rules of this build do not let that pass.',
    )
    expect(rulesWords(round.rules)).toBe(
      'An approval needs 2 approving verdicts and no open danger or fault. Verdicts of guests are shown, but do not count.',
    )
  })
})
