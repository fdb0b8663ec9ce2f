import { describe, expect, it } from 'vitest'
import { asText, fileName, readJsonFile } from '../../../src/composables/useFiles.ts'
import { relativeTime } from '../../../src/composables/useWhen.ts'
import { splitLinks } from '../../../src/components/account/splitLinks.ts'
import { defaultsFor } from '../../../src/stores/preferences.ts'

describe('a time in words', () => {
  const now = Date.parse('2026-12-01T12:00:00Z')
  const told = (iso: string) => relativeTime(iso, now, 'en')
  it('goes from just now to the date', () => {
    expect(told('2026-12-01T11:59:30Z')).toBe('just now')
    expect(told('2026-12-01T11:59:00Z')).toBe('1 minute ago')
    expect(told('2026-12-01T09:30:00Z')).toBe('2 hours ago')
    expect(told('2026-11-30T11:00:00Z')).toBe('yesterday')
    expect(told('2026-11-10T12:00:00Z')).toBe('Nov 10, 2026')
  })
  it('never speaks of the future where clocks differ', () => expect(told('2026-12-01T12:00:40Z')).toBe('just now'))
})

describe('a file', () => {
  it('gets a name that every system takes', () => {
    expect(fileName('Reel vault, north room', 'json')).toBe('reel-vault-north-room.json')
    expect(fileName('../../etc/passwd', 'json')).toBe('etc-passwd.json')
    expect(fileName('日本', 'json')).toBe('bayloom.json')
    expect(fileName('Größe', 'json')).toBe('gro-e.json')
  })
  it('is read as JSON or refused with the reason', async () => {
    expect(await readJsonFile(new File([asText({ a: [1] })], 'a.json'))).toEqual({ ok: true, value: { a: [1] } })
    expect(await readJsonFile(new File(['{'], 'a.json'))).toMatchObject({ ok: false })
    expect(await readJsonFile(new File(['12345'], 'a.json'), 4)).toMatchObject({ ok: false })
  })
})

describe('what a person sees first', () => {
  it('follows the region of their language', () => {
    expect(defaultsFor('en-US')).toEqual({ length: 'in', wire: 'awg', paper: 'letter' })
    expect(defaultsFor('en-CA')).toEqual({ length: 'mm', wire: 'awg', paper: 'letter' })
    expect(defaultsFor('de-DE')).toEqual({ length: 'mm', wire: 'awg', paper: 'a4' })
    expect(defaultsFor('nl')).toEqual({ length: 'mm', wire: 'awg', paper: 'a4' })
  })
})

describe('links in a message', () => {
  it('are told from the words around them', () =>
    expect(splitLinks('Open it:\nhttps://bayloom.example/invitations/abc\n\nBayloom')).toEqual([
      { text: 'Open it:\n', link: false },
      { text: 'https://bayloom.example/invitations/abc', link: true },
      { text: '\n\nBayloom', link: false },
    ]))
  it('are only web addresses', () =>
    expect(splitLinks('javascript:alert(1) <b>').every((piece) => !piece.link)).toBe(true))
})
