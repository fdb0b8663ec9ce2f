import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { openEventStream } from '../../../src/api/eventStream.ts'

/** A browser's end of a stream, driven by the test. */
class FakeSource extends EventTarget {
  static readonly CLOSED = 2
  static all: FakeSource[] = []
  readyState = 0
  onopen: (() => void) | null = null
  onerror: (() => void) | null = null
  readonly url: string
  constructor(url: string) {
    super()
    this.url = url
    FakeSource.all.push(this)
  }
  close() {
    this.readyState = FakeSource.CLOSED
  }
  hear(name: string, data: unknown, lastEventId = '') {
    this.dispatchEvent(new MessageEvent(name, { data: JSON.stringify(data), lastEventId }))
  }
  giveUp() {
    this.readyState = FakeSource.CLOSED
    this.onerror?.()
  }
}

const line = (id: number) => ({
  id,
  buildId: 'b',
  at: '2026-12-01T10:00:00Z',
  by: { kind: 'former' },
  what: { kind: 'build-archived' },
})
const address = (after: number | null) => `/events?after=${after}`
const newest = () => FakeSource.all.at(-1)!

let isHidden = false
const look = (hidden: boolean) => {
  isHidden = hidden
  document.dispatchEvent(new Event('visibilitychange'))
}

beforeEach(() => {
  FakeSource.all = []
  isHidden = false
  vi.stubGlobal('EventSource', FakeSource)
  vi.useFakeTimers()
  vi.spyOn(document, 'visibilityState', 'get').mockImplementation(() => (isHidden ? 'hidden' : 'visible'))
})
afterEach(() => {
  vi.useRealTimers()
  vi.restoreAllMocks()
  vi.unstubAllGlobals()
})

describe('a stream of events', () => {
  it('where the browser gives up, it comes back later each time and asks for what came after the last line', () => {
    const heard: number[] = []
    const close = openEventStream(address, { activity: ({ id }) => heard.push(id) })
    newest().hear('hello', { lastId: 7, revision: 1, present: [] }, '7')
    newest().hear('activity', line(9), '9')
    newest().giveUp()
    vi.advanceTimersByTime(1_999)
    expect(FakeSource.all).toHaveLength(1)
    vi.advanceTimersByTime(1)
    expect(newest().url).toBe('/events?after=9')
    newest().giveUp()
    vi.advanceTimersByTime(2_000)
    expect(FakeSource.all).toHaveLength(2)
    vi.advanceTimersByTime(2_000)
    expect(FakeSource.all).toHaveLength(3)
    expect(heard).toEqual([9])
    close()
  })

  it('a short break is the browser’s own matter', () => {
    const states: boolean[] = []
    const close = openEventStream(address, { onConnected: (connected) => states.push(connected) })
    newest().onopen?.()
    newest().onerror?.()
    vi.advanceTimersByTime(100_000)
    expect(FakeSource.all).toHaveLength(1)
    expect(states).toEqual([true, false])
    close()
  })

  it('does not come back once its access is gone, whatever is heard or looked at', () => {
    const ends: string[] = []
    const close = openEventStream(address, { end: ({ reason }) => ends.push(reason) })
    newest().hear('end', { reason: 'access' })
    expect(newest().readyState).toBe(FakeSource.CLOSED)
    look(true)
    look(false)
    window.dispatchEvent(new Event('online'))
    vi.advanceTimersByTime(100_000)
    expect([FakeSource.all.length, ends]).toEqual([1, ['access']])
    close()
  })

  it('pushed out by newer tabs it comes back when it is looked at', () => {
    const close = openEventStream(address, {})
    newest().hear('end', { reason: 'too-many' })
    vi.advanceTimersByTime(100_000)
    expect(FakeSource.all).toHaveLength(1)
    look(false)
    expect(FakeSource.all).toHaveLength(2)
    close()
  })

  it('is given up by a page that stays hidden, and taken up from the same line', () => {
    const close = openEventStream(address, {})
    newest().hear('hello', { lastId: 3, revision: 1, present: [] }, '3')
    look(true)
    vi.advanceTimersByTime(29_000)
    look(false)
    expect(newest().readyState).not.toBe(FakeSource.CLOSED)
    look(true)
    vi.advanceTimersByTime(30_000)
    expect(newest().readyState).toBe(FakeSource.CLOSED)
    look(false)
    expect([FakeSource.all.length, newest().url]).toEqual([2, '/events?after=3'])
    close()
    expect(newest().readyState).toBe(FakeSource.CLOSED)
  })

  it('passes over what it does not know', () => {
    const heard: number[] = []
    const close = openEventStream(address, { activity: ({ id }) => heard.push(id) })
    newest().hear('activity', { id: 'nonsense' })
    newest().hear('activity', line(2), '2')
    expect(heard).toEqual([2])
    close()
  })
})
