import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest'
import type { z } from 'zod'
import { happeningSchema, type Happening } from '#shared/contract/activity.ts'
import { buildListSchema, openBuildSchema } from '#shared/contract/build.ts'
import { madeLinkSchema } from '#shared/contract/buildLinks.ts'
import { askedRoundSchema, roundSchema, roundsAnswerSchema, type Round } from '#shared/contract/rounds.ts'
import { BuildMember } from '../../server/models/index.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { addCable, cablesDocument, edit, note, save } from './support/documents.ts'

let api: Api
let owner: Client
let editor: Client
let reviewer: Client
let reader: Client
let buildId: string
let rounds: string

beforeAll(async () => {
  api = await startApi({ settings: { RATE_LIMIT_FACTOR: '1000' } })
  owner = await api.person({ name: 'Owner' })
  editor = await api.person({ name: 'Editor' })
  reviewer = await api.person({ name: 'Reviewer', email: 'reviewer@example.org' })
  reader = await api.person({ name: 'Reader' })
})
afterAll(() => api.close())
beforeEach(async () => {
  const made = await owner.post('/api/builds/import', { document: cablesDocument('North room', 2) })
  buildId = openBuildSchema.parse(made.body).id
  rounds = `/api/builds/${buildId}/rounds`
  for (const [client, role] of [
    [editor, 'editor'],
    [reviewer, 'reviewer'],
    [reader, 'reader'],
  ] as const)
    await BuildMember.create({ buildId, userId: idOf(client), role })
})

const idOf = (client: Client): string => client.user?.id ?? ''
const ask = async (by: Client = owner, more: object = {}) => {
  const response = await by.post(rounds, { question: 'Will T1 start them all?', reviewers: [idOf(reviewer)], ...more })
  expect(response.status, response.text).toBe(201)
  return askedRoundSchema.parse(response.body)
}
const judge = (by: Client, round: Round, verdict: 'approve' | 'ask-for-changes', summary = 'seen') =>
  by.put(`${rounds}/${round.id}/verdict`, { verdict, summary })
const approve = async (by: Client, round: Round) => {
  const response = await judge(by, round, 'approve')
  expect(response.status, response.text).toBe(200)
  return roundSchema.parse(response.body)
}
const list = async (by: Client = owner) => roundsAnswerSchema.parse((await by.get(rounds)).body)
const review = async (by: Client = owner) => openBuildSchema.parse((await by.get(`/api/builds/${buildId}`)).body).review
const change = async (by: Client, base: number, ...changes: Parameters<typeof edit>[1][]) => {
  const response = await by.post(`/api/builds/${buildId}/revisions`, save(base, edit('Change', ...changes)))
  expect(response.status, response.text).toBe(201)
}
const guestOf = async (kind: 'read' | 'review') => {
  const made = await owner.post(`/api/builds/${buildId}/links`, { kind, label: kind, days: 1 })
  return comeBy(madeLinkSchema.parse(made.body).token)
}
const comeBy = async (token: string) => {
  const guest = await api.visitor()
  expect((await guest.post(`/api/links/${token}/guests`, { name: 'Jo' })).status).toBe(201)
  return guest
}
const happened = async (...kinds: Happening['kind'][]): Promise<z.infer<typeof happeningSchema>[]> => {
  const [rows] = await api.context.database.query(
    'SELECT kind, details FROM activity WHERE build_id = $1 AND kind = ANY($2) ORDER BY id',
    { bind: [buildId, kinds] },
  )
  return (rows as { kind: string; details: object }[]).map(({ kind, details }) =>
    happeningSchema.parse({ kind, ...details }),
  )
}

describe('asking', () => {
  test('freezes the newest revision while work goes on', async () => {
    const { round } = await ask()
    await change(owner, 1, addCable(3))
    expect(round).toMatchObject({ number: 1, revision: 1, state: 'open', standing: 'waiting', previousRevision: null })
    expect((await list()).rounds[0]).toMatchObject({ revision: 1, askedBy: { name: 'Owner' } })
    expect((await review()).open).toEqual({ round: 1, revision: 1, changesAsked: false })
    expect(await happened('round-asked')).toEqual([
      {
        kind: 'round-asked',
        roundId: round.id,
        round: 1,
        revision: 1,
        asked: [idOf(reviewer)],
        question: 'Will T1 start them all?',
      },
    ])
  })

  test('may name an earlier revision, but none that is not there', async () => {
    await change(owner, 1, addCable(3))
    expect((await ask(owner, { revision: 1 })).round.revision).toBe(1)
    const refused = await owner.post(rounds, { reviewers: [idOf(reviewer)], revision: 3 })
    expect(refused.body).toMatchObject({ code: 'bad-input', errors: [{ path: 'revision' }] })
  })

  test('names reviewers and up, not oneself, not readers, not strangers', async () => {
    const stranger = await api.person()
    for (const client of [owner, reader, stranger]) {
      const refused = await owner.post(rounds, { reviewers: [idOf(client)] })
      expect(refused.body).toMatchObject({ code: 'bad-input', errors: [{ path: 'reviewers[0]' }] })
    }
    expect((await owner.post(rounds, { question: 'Anybody?' })).status).toBe(400)
    expect((await list()).rounds).toEqual([])
  })

  test('invites by mail in the same step, and the invited person stands among the asked', async () => {
    const { round } = await ask(owner, { reviewers: [], invite: ['new@example.org', 'reviewer@example.org'] })
    expect(round.asked.map(({ name, email }) => [name, email])).toEqual([
      ['Reviewer', null],
      [null, 'new@example.org'],
    ])
    const [mails] = await api.context.database.query('SELECT text_body FROM messages WHERE recipient = $1', {
      bind: ['new@example.org'],
    })
    const token = /invitations\/([\w-]+)/.exec((mails as { text_body: string }[])[0]?.text_body ?? '')?.[1]
    const invited = await api.person({ email: 'new@example.org', name: 'Newcomer' })
    expect((await list()).rounds[0]?.asked[1]?.name).toBeNull()
    expect((await invited.post(`/api/invitations/${token}/accept`)).status).toBe(200)
    expect((await list()).rounds[0]?.asked.map(({ name }) => name)).toEqual(['Newcomer', 'Reviewer'])
    expect((await approve(invited, round)).standing).toBe('approved')
    expect(await happened('member-joined')).toEqual([{ kind: 'member-joined', role: 'reviewer' }])
  })

  test('by link makes a review link that is told once', async () => {
    const { token, round } = await ask(owner, { reviewers: [], link: { days: 7 } })
    expect(round.byLink).toBe(true)
    const guest = await comeBy(token ?? '')
    expect((await approve(guest, round)).verdicts[0]?.by).toMatchObject({ kind: 'guest', name: 'Jo' })
  })

  test('by an editor reaches members alone', async () => {
    for (const more of [{ invite: ['x@example.org'] }, { link: { days: 1 } }])
      expect((await editor.post(rounds, { reviewers: [idOf(reviewer)], ...more })).status).toBe(403)
    expect((await ask(editor)).round.askedBy).toMatchObject({ name: 'Editor' })
  })

  test('anew ends the round before, and says from which revision to compare', async () => {
    const { round: first } = await ask()
    await judge(reviewer, first, 'ask-for-changes', 'C2 is on the wrong lead')
    await change(owner, 1, addCable(3))
    const { round: second } = await ask()
    expect(second).toMatchObject({ number: 2, revision: 2, previousRevision: 1 })
    expect((await list()).rounds.map(({ number, state, standing }) => [number, state, standing])).toEqual([
      [2, 'open', 'waiting'],
      [1, 'closed', 'changes asked'],
    ])
    expect(await happened('round-closed')).toEqual([{ kind: 'round-closed', roundId: first.id, round: 1 }])
    expect((await judge(reviewer, first, 'approve')).body).toMatchObject({ code: 'conflict' })
  })
})

describe('a verdict', () => {
  test('is given by reviewers and up and by guests of review links, never by the asker or who may only read', async () => {
    const { round } = await ask(editor)
    const [reading, reviewing] = [await guestOf('read'), await guestOf('review')]
    const answers = await Promise.all(
      [editor, reader, reading, owner, reviewer, reviewing].map(
        async (by) => (await judge(by, round, 'approve')).status,
      ),
    )
    expect(answers).toEqual([403, 403, 403, 200, 200, 200])
    const may = await Promise.all(
      [editor, reader, reading, owner, reviewer, reviewing].map(async (by) => (await list(by)).rounds[0]?.mayJudge),
    )
    expect(may).toEqual([false, false, false, true, true, true])
  })

  test('can be changed while the round is open, and needs words where it asks for changes', async () => {
    const { round } = await ask()
    expect((await judge(reviewer, round, 'ask-for-changes', '')).body).toMatchObject({ errors: [{ path: 'summary' }] })
    await judge(reviewer, round, 'ask-for-changes', 'W2 carries too much')
    expect((await review()).open?.changesAsked).toBe(true)
    const after = await approve(reviewer, round)
    expect(after.verdicts).toHaveLength(1)
    expect(after.verdicts[0]).toMatchObject({ verdict: 'approve', mine: true })
    expect((await list()).rounds[0]?.verdicts[0]?.mine).toBe(false)
    await judge(reviewer, round, 'ask-for-changes', 'after all')
    expect((await review()).approval).toBeNull()
    expect((await happened('verdict-given')).map((what) => what.kind === 'verdict-given' && what.verdict)).toEqual([
      'ask-for-changes',
      'approve',
      'ask-for-changes',
    ])
  })

  test('approves as soon as the rules are met, and one request for changes outweighs it', async () => {
    const path = `/api/builds/${buildId}/review-rules`
    const rules = { approvals: 2, heldBackBy: 'none', guestsCount: false }
    expect((await editor.put(path, rules)).status).toBe(403)
    expect((await owner.put(path, rules)).status).toBe(200)
    const { round } = await ask()
    const guest = await guestOf('review')
    await approve(guest, round)
    expect((await approve(reviewer, round)).standing).toBe('waiting')
    expect((await approve(editor, round)).standing).toBe('approved')
    await judge(guest, round, 'ask-for-changes')
    expect((await list()).rounds[0]?.standing).toBe('approved')
    await judge(editor, round, 'ask-for-changes')
    expect((await list()).rounds[0]?.standing).toBe('changes asked')
  })

  test('is held back by an open fault where the owners say so, and a round keeps the rules it was asked under', async () => {
    // Cables alone have nothing to say; a drive that nothing feeds does.
    const unfed = { op: 'addPart', part: { id: 'c1', model: 'hdd-35-7200-sata-4tb', ref: 'C1' } } as const
    await change(owner, 1, unfed)
    await owner.put(`/api/builds/${buildId}/review-rules`, { approvals: 1, heldBackBy: 'fault', guestsCount: true })
    const { round } = await ask()
    expect((round.stops?.danger ?? 0) + (round.stops?.fault ?? 0)).toBeGreaterThan(0)
    await owner.put(`/api/builds/${buildId}/review-rules`, { approvals: 1, heldBackBy: 'none', guestsCount: true })
    expect((await approve(reviewer, round)).standing).toBe('held back')
    expect((await review()).approval).toBeNull()
    expect((await approve(reviewer, (await ask()).round)).standing).toBe('approved')
  })
})

describe('an approval', () => {
  test('stands with its revision in list and build, and lapses at the first change that matters, once', async () => {
    const { round } = await ask()
    await approve(reviewer, round)
    const approval = { round: 1, revision: 1, by: [{ name: 'Reviewer', guest: false }], lapsedRevision: null }
    expect((await review()).approval).toMatchObject(approval)
    const listed = buildListSchema.parse((await owner.get('/api/builds?pageSize=100')).body)
    expect(listed.items.find(({ id }) => id === buildId)?.review).toMatchObject({ approval, open: null })

    await change(editor, 1, { op: 'updatePart', id: 'p1', patch: { position: { x: 40, y: 80 } } })
    await change(editor, 2, { op: 'setPurchase', line: 'test-data-cable', purchase: { owned: 1 } })
    expect((await review()).approval?.lapsedRevision).toBeNull()
    await change(editor, 3, note('p1', 'another lead'))
    expect((await review()).approval).toMatchObject({ revision: 1, lapsedRevision: 4 })
    await change(editor, 4, note('p1', 'a third lead'))
    await change(editor, 5, note('p1', 'cable 1'))
    expect((await review()).approval?.lapsedRevision).toBe(4)
    expect((await list()).rounds[0]?.standing).toBe('lapsed')
    expect(await happened('approval-lapsed')).toEqual([
      { kind: 'approval-lapsed', roundId: round.id, round: 1, revision: 1 },
    ])
  })

  test('that comes when the diagram has moved on has lapsed already', async () => {
    const { round } = await ask()
    await change(editor, 1, addCable(3))
    expect((await approve(reviewer, round)).standing).toBe('lapsed')
    expect((await review()).approval).toMatchObject({ revision: 1, lapsedRevision: 2 })
    expect(await happened('approval-lapsed')).toHaveLength(1)
  })

  test('stands after the round is closed, and goes with a round that is withdrawn', async () => {
    const end = (round: Round, as: string, by = owner) => by.post(`${rounds}/${round.id}/end`, { as })
    const { round } = await ask()
    await approve(reviewer, round)
    expect((await end(round, 'closed', reviewer)).status).toBe(403)
    expect(roundSchema.parse((await end(round, 'closed')).body)).toMatchObject({
      state: 'closed',
      standing: 'approved',
    })
    expect((await review()).approval?.revision).toBe(1)
    expect((await end(round, 'withdrawn')).status).toBe(409)
    const { round: second } = await ask()
    await approve(reviewer, second)
    expect(roundSchema.parse((await end(second, 'withdrawn')).body).standing).toBe('withdrawn')
    expect((await review()).approval).toMatchObject({ round: 1 })
  })

  test('given while somebody saves is never left standing on the older state', async () => {
    const { round } = await ask()
    await Promise.all([approve(reviewer, round), change(editor, 1, addCable(3))])
    expect((await review()).approval).toMatchObject({ revision: 1, lapsedRevision: 2 })
  })
})

test('a guest sees rounds and verdicts, and no address of anybody', async () => {
  await ask(owner, { invite: ['secret@example.org'] })
  const guest = await guestOf('read')
  const response = await guest.get(rounds)
  expect(response.text).not.toContain('@')
  expect(roundsAnswerSchema.parse(response.body).rounds[0]?.asked).toEqual([
    { userId: idOf(reviewer), name: 'Reviewer', email: null },
    { userId: null, name: null, email: null },
  ])
})
