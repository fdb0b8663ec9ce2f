import express, { type Request, type Response } from 'express'
import { Refusal } from '../services/refusal.ts'

/** Most bytes of an uploaded picture: what phones make. */
const limit = '12mb'
const parser = express.raw({ type: 'image/*', limit })

/** Reads the raw body of an upload, within its limit. What the bytes really are is found out by who uses them. */
export async function readPhotoBody(request: Request, response: Response): Promise<Buffer> {
  if (!request.is('image/*'))
    throw new Refusal('bad-input', { detail: 'Send a picture as the body, with its image type.' })
  await new Promise<void>((resolve, reject) =>
    parser(request, response, (error?: unknown) => (error ? reject(error as Error) : resolve())),
  )
  const body: unknown = request.body
  if (!Buffer.isBuffer(body) || body.length === 0) throw new Refusal('bad-input', { detail: 'The picture is empty.' })
  return body
}
