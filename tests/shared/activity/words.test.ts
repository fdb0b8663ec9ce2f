import { describe, expect, it } from 'vitest'
import { gatherActivity, lineSentence } from '#shared/activity/gather.ts'
import { buildPath, placeOf } from '#shared/activity/place.ts'
import { activitySentence, happeningWords, initials, noticeSentence } from '#shared/activity/words.ts'
import type { Activity, Author, Happening } from '#shared/contract/activity.ts'

const irma: Author = { kind: 'member', userId: 'u1', name: 'Irma Solberg' }
const teo: Author = { kind: 'member', userId: 'u2', name: 'Teo Marchetti' }
const guest: Author = { kind: 'guest', guestId: 'g1', name: 'Rune' }
let id = 1000
const line = (by: Author, what: Happening): Activity => ({
  id: id--,
  buildId: 'b',
  at: '2026-12-01T10:00:00Z',
  by,
  what,
})
const saved = (revision: number, label = `Move C${revision}`): Happening => ({
  kind: 'revision-saved',
  revision,
  label,
})
const comment: Happening = {
  kind: 'comment-added',
  threadId: 't 1',
  commentId: 'c1',
  about: 'W4 outlet 2',
  excerpt: 'Too long?',
  mentions: [],
  repliesTo: [],
}

describe('activity in words', () => {
  it.each<[Happening, string]>([
    [saved(12, 'Add C7'), 'saved revision 12: Add C7'],
    [saved(12, ''), 'saved revision 12'],
    [{ kind: 'revision-named', revision: 3, name: 'As built' }, 'named revision 3 "As built"'],
    [{ kind: 'revision-named', revision: 3, name: null }, 'took the name off revision 3'],
    [{ kind: 'revision-restored', revision: 9, restored: 4 }, 'restored revision 4 as revision 9'],
    [comment, 'commented on W4 outlet 2: "Too long?"'],
    [{ ...comment, repliesTo: ['u1'], excerpt: '' }, 'answered on W4 outlet 2'],
    [
      { kind: 'verdict-given', roundId: 'r', round: 2, revision: 7, verdict: 'ask-for-changes', summary: '' },
      'asked for changes in revision 7 (review 2)',
    ],
    [{ kind: 'guest-joined', name: 'Rune' }, 'came by a link'],
  ])('%j', (what, words) => expect(happeningWords(what)).toBe(words))

  it('tells leaving from being taken out, and a guest from a member', () => {
    const left: Happening = { kind: 'member-left', userId: 'u2', name: 'Teo Marchetti' }
    expect(activitySentence(teo, left)).toBe('Teo Marchetti left the build')
    expect(activitySentence(irma, left)).toBe('Irma Solberg took Teo Marchetti out of the build')
    expect(activitySentence(guest, { kind: 'guest-joined', name: 'Rune' })).toBe('Rune (guest) came by a link')
    expect(activitySentence({ kind: 'former' }, saved(2, ''))).toBe('Former member saved revision 2')
  })

  it('speaks to the person who is told', () => {
    const role: Happening = { kind: 'role-changed', userId: 'u2', name: 'Teo Marchetti', role: 'editor' }
    expect(noticeSentence({ reason: 'people', activity: line(irma, role) })).toBe('Irma Solberg made you editor')
    expect(noticeSentence({ reason: 'mention', activity: line(irma, comment) })).toBe(
      'Irma Solberg mentioned you in the comments on W4 outlet 2: "Too long?"',
    )
    expect(noticeSentence({ reason: 'comment', activity: line(irma, comment) })).toBe(
      'Irma Solberg commented on W4 outlet 2: "Too long?"',
    )
  })

  it('takes two letters of any name', () => {
    expect(['Irma Solberg', 'Teo', 'Noor van den Castellan', '  ', 'Öde-Älv'].map(initials)).toEqual([
      'IS',
      'T',
      'NC',
      '?',
      'ÖÄ',
    ])
  })
})

describe('gathering', () => {
  it('makes the saves of one person in a row one line, newest first', () => {
    const lines = gatherActivity([
      line(irma, saved(9)),
      line(irma, saved(8)),
      line(irma, saved(7)),
      line(teo, saved(6)),
      line(irma, comment),
      line(irma, saved(5)),
    ])
    expect(lines.map(lineSentence)).toEqual([
      'Irma Solberg saved revisions 7 to 9, last: Move C9',
      'Teo Marchetti saved revision 6: Move C6',
      'Irma Solberg commented on W4 outlet 2: "Too long?"',
      'Irma Solberg saved revision 5: Move C5',
    ])
  })

  it('of nothing is nothing', () => expect(gatherActivity([])).toEqual([]))
})

describe('where a line leads', () => {
  it('is the very thing, or the build', () => {
    expect(buildPath('b', placeOf(comment))).toBe('/builds/b?thread=t%201&comment=c1')
    expect(buildPath('b', placeOf(saved(4)))).toBe('/builds/b?show=history&revision=4')
    expect(buildPath('b', placeOf({ kind: 'round-closed', roundId: 'r', round: 1 }))).toBe(
      '/builds/b?show=review&round=r',
    )
    expect(buildPath('b', placeOf({ kind: 'build-archived' }))).toBe('/builds/b')
  })
})
