import { pino } from 'pino'
import { expect, test } from 'vitest'
import { makeJobLoop } from '../../server/jobs/jobLoop.ts'

const log = pino({ level: 'silent' })

test('works until nothing waits', async () => {
  let waiting = 120
  const loop = makeJobLoop({ count: () => Promise.resolve(waiting > 0 && waiting-- > 0) }, log)
  await loop.drain()
  expect(waiting).toBe(0)
})

test('goes on with the other jobs when one fails', async () => {
  let done = 0
  const loop = makeJobLoop(
    { broken: () => Promise.reject(new Error('broken')), sound: () => Promise.resolve(done++ < 2) },
    log,
  )
  await loop.drain()
  expect(done).toBeGreaterThanOrEqual(3)
})

test('does what is queued while it works, and finishes the piece at hand before it stops', async () => {
  const seen: string[] = []
  let queue = ['first']
  const loop = makeJobLoop(
    {
      take: () => {
        const next = queue.shift()
        if (next === undefined) return Promise.resolve(false)
        seen.push(next)
        if (next === 'first') {
          queue = ['second']
          loop.wake()
        }
        return Promise.resolve(true)
      },
    },
    log,
  )
  loop.start()
  await loop.stop()
  expect(seen).toEqual(['first', 'second'])
})

test('does at once what one job leaves for another, and wakes only whom it is told to', async () => {
  const tasks = ['first']
  const letters: string[] = []
  const sent: string[] = []
  let looks = 0
  const loop = makeJobLoop(
    {
      tell: () => {
        const task = tasks.shift()
        if (task !== undefined) letters.push(task)
        return Promise.resolve(task !== undefined)
      },
      send: () => {
        const letter = letters.shift()
        if (letter !== undefined) sent.push(letter)
        return Promise.resolve(letter !== undefined)
      },
      look: () => Promise.resolve(looks++ < 0),
    },
    log,
  )
  loop.start()
  await expect.poll(() => sent).toEqual(['first'])
  await loop.stop()
  const before = looks
  loop.start()
  await expect.poll(() => looks).toBe(before + 1)
  loop.wake('send')
  tasks.push('second')
  loop.wake('tell')
  await expect.poll(() => sent).toEqual(['first', 'second'])
  await loop.stop()
})
