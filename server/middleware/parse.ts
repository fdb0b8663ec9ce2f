import type { z } from 'zod'
import { problemsOf } from '#shared/build/problems.ts'
import { Refusal } from '../services/refusal.ts'

/** Parses a part of the request; refuses it with every bad place named. */
export function parse<Schema extends z.ZodType>(schema: Schema, input: unknown): z.output<Schema> {
  const parsed = schema.safeParse(input)
  if (!parsed.success) throw new Refusal('bad-input', { errors: problemsOf(parsed.error) })
  return parsed.data
}
