import express, { type Request, type Response } from 'express'
import { formatPath } from '#shared/build/problems.ts'
import { Refusal } from '../services/refusal.ts'

/** Most bytes of a body: documents and edits are large, everything else is small. */
const limits = { small: '64kb', model: '512kb', document: '4mb' } as const
export type BodyLimit = keyof typeof limits

/** Nesting that no request of ours reaches. */
const maxDepth = 40

const parsers = {
  small: express.json({ limit: limits.small, strict: false }),
  model: express.json({ limit: limits.model, strict: false }),
  document: express.json({ limit: limits.document, strict: false }),
}

/** Reads the JSON body of a request, within its limit of size, depth and text. */
export async function readBody(request: Request, response: Response, limit: BodyLimit): Promise<unknown> {
  if (!hasBody(request)) return undefined
  if (!request.is('application/json')) throw new Refusal('not-json')
  await new Promise<void>((resolve, reject) =>
    parsers[limit](request, response, (error?: unknown) => (error ? reject(error as Error) : resolve())),
  )
  const body: unknown = request.body
  refuseWild(body)
  return body
}

const hasBody = (request: Request): boolean =>
  request.headers['transfer-encoding'] !== undefined || Number(request.headers['content-length'] ?? 0) > 0

interface Place {
  value: unknown
  path: PropertyKey[]
}

/** Refuses nesting without end, and text that no database can hold, level by level and without recursion. */
function refuseWild(body: unknown): void {
  let level: Place[] = [{ value: body, path: [] }]
  for (let depth = 0; level.length > 0; depth++) {
    if (depth > maxDepth)
      throw new Refusal('bad-input', { errors: [{ path: '', message: `nested deeper than ${maxDepth} levels` }] })
    const next: Place[] = []
    for (const { value, path } of level) {
      if (typeof value === 'string') refuseWildText(value, path)
      if (typeof value !== 'object' || value === null) continue
      if (Array.isArray(value)) value.forEach((item, i) => keep(next, item, path, i))
      else
        for (const [key, item] of Object.entries(value)) {
          refuseWildText(key, path)
          keep(next, item, path, key)
        }
    }
    level = next
  }
}

function keep(next: Place[], value: unknown, path: PropertyKey[], key: PropertyKey): void {
  if (typeof value === 'string' || (typeof value === 'object' && value !== null))
    next.push({ value, path: [...path, key] })
}

const wildText = /\0|\p{Surrogate}/u

function refuseWildText(text: string, path: readonly PropertyKey[]): void {
  if (!wildText.test(text)) return
  throw new Refusal('bad-input', {
    errors: [{ path: formatPath(path), message: 'holds a NUL or half a character, which no text may' }],
  })
}
