import type { Round } from '#shared/contract/rounds.ts'

/** A round that waits for its first verdict. */
export const roundOf = (more: Partial<Round> = {}): Round => ({
  id: '3b1b6b0e-0000-4000-8000-000000000001',
  number: 2,
  revision: 12,
  previousRevision: 9,
  question: 'Does lead 1 hold?',
  state: 'open',
  standing: 'waiting',
  askedBy: { kind: 'member', userId: 'u1', name: 'Irma Solberg' },
  askedAt: '2026-12-01T10:00:00.000Z',
  endedAt: null,
  asked: [{ userId: 'u2', name: 'Noor Castellan', email: null }],
  byLink: true,
  rules: { approvals: 1, heldBackBy: 'none', guestsCount: true },
  stops: { danger: 0, fault: 3 },
  verdicts: [],
  lapsedRevision: null,
  mayJudge: true,
  ...more,
})
