import { describe, expect, it } from 'vitest'
import type { Edit } from '#shared/build/changes.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import type { DroppedChange } from '#shared/build/edits/rebase.ts'
import type { Draft } from '../../../../src/stores/save/draft.ts'
import { createSaver } from '../../../../src/stores/save/saver.ts'
import { saveWords, type SaveState } from '../../../../src/stores/save/state.ts'
import { documentOf, looseParts } from '../../../shared/build/edits/smallShop.ts'
import { fakeClock, fakeServer, memoryDrafts } from './fakes.ts'

const first = documentOf(looseParts)
const serial = (id: string, text: string): Edit => ({
  label: `Change serial of ${id}`,
  changes: [{ op: 'updatePart', id, patch: { serial: text } }],
})
const serialOf = (document: BuildDocument, id: string) => document.parts.find((part) => part.id === id)?.serial

let request = 0

function bench(resumed?: Draft) {
  const server = fakeServer(first)
  return tab(server, memoryDrafts(), resumed)
}

function tab(server: ReturnType<typeof fakeServer>, drafts = memoryDrafts(), resumed?: Draft) {
  const clock = fakeClock()
  const states: SaveState[] = []
  const shown: { document: BuildDocument; dropped: readonly DroppedChange[] }[] = []
  const draft: Draft = resumed ?? {
    key: 'tab-1',
    buildId: 'b1',
    base: 1,
    baseDocument: first,
    sending: null,
    waiting: [],
    savedAt: 0,
  }
  const saver = createSaver({
    draft,
    send: (saveRequest) => server.send(saveRequest),
    pull: () => server.pull(),
    drafts,
    makeRequestId: () => `r${++request}`,
    now: clock.now,
    later: clock.later,
    onState: (state) => states.push(state),
    onDocument: (document, dropped) => shown.push({ document, dropped }),
  })
  return { server, drafts, clock, states, shown, saver, words: () => saveWords(saver.state()) }
}

describe('saver', () => {
  it('gathers a burst into one revision and says so', async () => {
    const { saver, server, clock, words, drafts } = bench()
    expect(words()).toBe('saved, revision 1')
    saver.add(serial('c1', 'A'))
    saver.add(serial('c2', 'B'))
    expect(words()).toBe('saving')
    expect(drafts.kept.get('tab-1')?.waiting).toHaveLength(2)
    clock.advance(699)
    expect(server.received).toBe(0)
    clock.advance(1)
    await saver.flush()
    expect(server.revision).toBe(2)
    expect(words()).toBe('saved, revision 2')
    expect(drafts.kept.size).toBe(0)
  })

  it('sends edits made during a save in the next one', async () => {
    const { saver, server } = bench()
    saver.add(serial('c1', 'A'))
    const saving = saver.flush()
    saver.add(serial('c1', 'B'))
    await saving
    await saver.flush()
    expect(serialOf(server.newest(), 'c1')).toBe('B')
    expect(server.revision).toBe(3)
    expect(saver.unsaved()).toBe(0)
  })

  it('keeps edits on this computer without a connection and sends them when it is back', async () => {
    const { saver, server, clock, words, drafts } = bench()
    server.mode = 'down'
    saver.add(serial('c1', 'A'))
    await saver.flush()
    saver.add(serial('c2', 'B'))
    expect(words()).toBe('not saved: no connection, kept on this computer')
    const kept = drafts.kept.get('tab-1')
    expect([kept?.sending?.edits.length, kept?.waiting.length]).toEqual([1, 1])
    server.mode = 'up'
    clock.advance(2000)
    await saver.flush()
    expect(words()).toBe('saved, revision 3')
    expect([serialOf(server.newest(), 'c1'), serialOf(server.newest(), 'c2')]).toEqual(['A', 'B'])
  })

  it('counts a request once when its answer got lost', async () => {
    const { saver, server, words } = bench()
    server.mode = 'loses-answers'
    saver.add({ label: 'Add W9', changes: [{ op: 'addPart', part: { id: 'n', model: 'lead-4', ref: 'W9' } }] })
    await saver.flush()
    expect(words()).toContain('no connection')
    expect(server.revision).toBe(2)
    server.mode = 'up'
    await saver.flush()
    expect(server.revision).toBe(2)
    expect(words()).toBe('saved, revision 2')
  })

  it('goes on after a reload from what was kept, even with an answer lost', async () => {
    const server = fakeServer(first)
    const before = tab(server)
    server.mode = 'loses-answers'
    before.saver.add(serial('c1', 'A'))
    await before.saver.flush()
    before.saver.add(serial('c2', 'B'))
    before.saver.close()
    const kept = (await before.drafts.list('b1'))[0]
    server.mode = 'up'
    const after = tab(server, before.drafts, kept)
    await after.saver.flush()
    expect([serialOf(server.newest(), 'c1'), serialOf(server.newest(), 'c2')]).toEqual(['A', 'B'])
    expect(server.revision).toBe(3)
    expect(after.drafts.kept.size).toBe(0)
  })

  it("takes others' edits in beneath its own", async () => {
    const { saver, server, shown } = bench()
    server.save([serial('c2', 'theirs')])
    saver.add(serial('c1', 'mine'))
    const saving = saver.flush()
    saver.add(serial('c3', 'later'))
    await saving
    const document = shown.at(-1)?.document
    expect(document && [serialOf(document, 'c1'), serialOf(document, 'c2'), serialOf(document, 'c3')]).toEqual([
      'mine',
      'theirs',
      'later',
    ])
    await saver.flush()
    expect(serialOf(server.newest(), 'c3')).toBe('later')
  })

  it('stops at a conflict, loses nothing, and goes on from what is chosen', async () => {
    const { saver, server, words, drafts } = bench()
    server.save([serial('c1', 'theirs')])
    saver.add(serial('c1', 'mine'))
    await saver.flush()
    expect(words()).toBe('not saved: somebody changed the same parts')
    saver.add(serial('c2', 'more'))
    await saver.flush()
    expect(server.revision).toBe(2)
    expect(drafts.kept.get('tab-1')?.waiting).toHaveLength(1)
    await saver.settle(server.newest(), [serial('c1', 'mine'), serial('c2', 'more')])
    expect(serialOf(server.newest(), 'c1')).toBe('mine')
    expect(words()).toBe('saved, revision 3')
  })

  it('waits for the person after the session ended', async () => {
    const { saver, server, words } = bench()
    server.mode = 'signed-out'
    saver.add(serial('c1', 'A'))
    await saver.flush()
    expect(words()).toBe('not saved: signed out, kept on this computer')
    server.mode = 'up'
    await saver.flush()
    expect(words()).toBe('saved, revision 2')
  })

  it('says why the server refuses and lets the person give the edits up', async () => {
    const { saver, server, words, shown, drafts, clock } = bench()
    server.mode = 'refuses'
    saver.add(serial('c1', 'A'))
    await saver.flush()
    expect(words()).toBe('not saved: a joint leads nowhere')
    expect(clock.pending).toBe(false)
    expect(drafts.kept.size).toBe(1)
    await saver.discard()
    expect(shown.at(-1)?.document).toEqual(first)
    expect(words()).toBe('saved, revision 1')
    expect(drafts.kept.size).toBe(0)
  })

  it('takes in what another tab saved, but never while something is on its way', async () => {
    const server = fakeServer(first)
    const one = tab(server)
    const two = tab(server)
    one.saver.add(serial('c1', 'from one'))
    await one.saver.flush()
    two.saver.add(serial('c2', 'from two'))
    await two.saver.refresh()
    const document = two.shown.at(-1)?.document
    expect(document && [serialOf(document, 'c1'), serialOf(document, 'c2')]).toEqual(['from one', 'from two'])
    await two.saver.flush()
    expect([serialOf(server.newest(), 'c1'), serialOf(server.newest(), 'c2')]).toEqual(['from one', 'from two'])
    expect(server.revision).toBe(3)
  })

  it('cuts more edits than one request may hold into several', async () => {
    const { saver, server } = bench()
    for (let i = 0; i < 501; i++) saver.add(serial('c1', `S${i}`))
    await saver.flush()
    expect(server.received).toBe(2)
    expect(serialOf(server.newest(), 'c1')).toBe('S500')
  })
})
