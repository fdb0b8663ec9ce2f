import { describe, expect, it } from 'vitest'
import { z } from 'zod'
import { formatPath, problemsOf } from '#shared/build/problems.ts'

const problems = (schema: z.ZodType, input: unknown) => problemsOf(schema.safeParse(input).error!)

describe('a path', () => {
  it('reads as people write it', () => {
    expect(formatPath(['parts', 3, 'bay', 'slot'])).toBe('parts[3].bay.slot')
    expect(formatPath([])).toBe('')
  })
})

describe('problems', () => {
  const schema = z.strictObject({
    name: z.string().min(1),
    parts: z.array(z.strictObject({ ref: z.string().min(2, 'use a class letter and a number') })),
  })

  it('say what is missing, empty or unknown in plain words', () => {
    expect(problems(schema, { name: '', odd: 1 })).toEqual([
      { path: 'name', message: 'is empty' },
      { path: 'parts', message: 'missing, expected a list' },
      { path: 'odd', message: 'unknown field' },
    ])
  })

  it('keep what the schema itself says', () =>
    expect(problems(schema, { name: 'a', parts: [{ ref: 'W' }] })).toEqual([
      { path: 'parts[0].ref', message: 'use a class letter and a number' },
    ]))

  it('call nothing empty that is only too short', () =>
    expect(problems(z.object({ code: z.string().min(4) }), { code: 'ab' })[0]?.message).not.toBe('is empty'))
})
