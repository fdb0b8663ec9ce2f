import { open, type FileHandle } from 'node:fs/promises'

/** Larger than any document within the limits of the format. */
const most_B = 64 * 1024 * 1024

export type Input = { ok: true; text: string } | { ok: false; reason: string }

const reasons: Readonly<Record<string, string>> = {
  ENOENT: 'no such file',
  EACCES: 'may not be read by this user',
  EPERM: 'may not be read by this user',
  ENOTDIR: 'no such file',
  EISDIR: 'is a folder, not a file',
  ENAMETOOLONG: 'no such file',
  ELOOP: 'a ring of links',
}

/** Reads a file, or the standard input for "-", as text. Never throws. */
export async function readInput(file: string, standardInput: AsyncIterable<Buffer>): Promise<Input> {
  try {
    const bytes = file === '-' ? await gather(standardInput) : await readFile(file)
    if (bytes === null) return { ok: false, reason: `larger than ${most_B / 1024 / 1024} MB` }
    return { ok: true, text: new TextDecoder('utf-8', { fatal: true }).decode(bytes) }
  } catch (error) {
    return { ok: false, reason: reasonOf(error) }
  }
}

async function readFile(file: string): Promise<Buffer | null> {
  const handle: FileHandle = await open(file, 'r')
  try {
    if ((await handle.stat()).isDirectory()) throw Object.assign(new Error(), { code: 'EISDIR' })
    return await gather(handle.createReadStream({ autoClose: false }))
  } finally {
    await handle.close()
  }
}

/** All of a stream, or null where it holds more than a document can. */
async function gather(stream: AsyncIterable<Buffer>): Promise<Buffer | null> {
  const chunks: Buffer[] = []
  let total = 0
  for await (const chunk of stream) {
    total += chunk.length
    if (total > most_B) return null
    chunks.push(chunk)
  }
  return Buffer.concat(chunks)
}

function reasonOf(error: unknown): string {
  const code = error instanceof Error && 'code' in error ? String(error.code) : ''
  if (code === 'ERR_ENCODING_INVALID_ENCODED_DATA') return 'not text: a build document is JSON in UTF-8'
  return reasons[code] ?? `cannot be read (${code || 'unknown reason'})`
}
