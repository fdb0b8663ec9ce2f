import fc from 'fast-check'
import { expect, test } from 'vitest'
import { contentHash } from '../../server/services/contentHash.ts'

const turned = (value: unknown): unknown => {
  if (Array.isArray(value)) return value.map(turned)
  if (typeof value !== 'object' || value === null) return value
  return Object.fromEntries(
    Object.entries(value)
      .reverse()
      .map(([name, field]) => [name, turned(field)]),
  )
}

test('does not mind the order of fields', () => {
  fc.assert(fc.property(fc.jsonValue(), (value) => contentHash(turned(value)) === contentHash(value)))
})

test('is the same once the content has been through JSON', () => {
  fc.assert(
    fc.property(fc.jsonValue(), (value) => contentHash(JSON.parse(JSON.stringify(value))) === contentHash(value)),
  )
  expect(contentHash({ a: 1, b: undefined })).toBe(contentHash({ a: 1 }))
})

test('minds order in lists, kinds and values', () => {
  const different = [
    [1, 2],
    [2, 1],
    ['1', 2],
    [12],
    { a: 1, b: 2 },
    { a: 2, b: 1 },
    { a: { b: 1 } },
    [{ a: 1 }, { b: 2 }],
    null,
    'null',
    [],
    {},
    '',
  ]
  expect(new Set(different.map(contentHash)).size).toBe(different.length)
})
