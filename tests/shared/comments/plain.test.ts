import { describe, expect, test } from 'vitest'
import { buildDocumentSchema } from '#shared/build/document.ts'
import { aboutOf } from '#shared/comments/about.ts'
import { excerptOf, mentionsIn } from '#shared/comments/plain.ts'

const a = '3f0c1d9e-0d2a-4c1b-9a5e-1b2c3d4e5f60'
const b = '11111111-2222-4333-8444-555555555555'

test('each mention counts once, in order', () => {
  expect(mentionsIn(`@{${b}} @{${a}} @{${b}} @{nobody}`)).toEqual([b, a])
})

describe('an excerpt', () => {
  test('is one plain line with names', () => {
    const name = (id: string) => (id === a ? 'Ada Quill' : undefined)
    expect(excerptOf(`**W4** is\n\n- thin, @{${a}}\n- and @{${b}}`, name)).toBe(
      'W4 is thin, @Ada Quill; and @former member',
    )
  })

  test('is cut at its length, and not below', () => {
    expect(excerptOf('x'.repeat(160), () => undefined)).toBe('x'.repeat(160))
    expect(excerptOf('x'.repeat(161), () => undefined)).toBe(`${'x'.repeat(159)}…`)
  })
})

describe('what a pin is about', () => {
  const document = buildDocumentSchema.parse({
    format: 'bayloom-build',
    version: 1,
    name: 'n',
    parts: [
      { id: 'p1', model: 'm', ref: 'W1' },
      { id: 'p2', model: 'm', ref: 'C2' },
    ],
    joints: [{ id: 'j1', a: { part: 'p1', connector: 'out-1' }, b: { part: 'p2', connector: 'plug' } }],
  })

  test.each([
    [{ kind: 'build' }, 'the build'],
    [{ kind: 'part', part: 'p1' }, 'W1'],
    [{ kind: 'connector', part: 'p1', connector: 'out-1' }, 'W1 out-1'],
    [{ kind: 'joint', joint: 'j1' }, 'W1 out-1 to C2 plug'],
    [{ kind: 'part', part: 'p9' }, undefined],
    [{ kind: 'joint', joint: 'j9' }, undefined],
    [{ kind: 'finding', key: 'k' }, undefined],
  ] as const)('%j', (pin, words) => expect(aboutOf(pin, document)).toBe(words))
})
