import type { z } from 'zod'
import { problemSchema } from '#shared/contract/problems.ts'
import { isProblem, NetworkError, ProblemError, UnexpectedAnswerError } from './errors.ts'

/** What the client needs to know of the session. Set once at start, so that `api/` knows no store. */
export interface ClientSession {
  csrfToken(): string
  /** Fetches a fresh token after the server no longer takes the old one. Who the page takes as signed in stays. */
  renewToken(): Promise<void>
  /**
   * Called where the session ended while a page was in use. Resolves true once the same person has signed in again,
   * and the request is then sent once more; false where they declined.
   */
  signInAgain(): Promise<boolean>
}

let session: ClientSession | undefined

export function connectSession(connected: ClientSession): void {
  session = connected
}

export type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE'
export interface RequestOptions {
  body?: unknown
  /** Sent as it is, with its own type, instead of a JSON body. */
  file?: Blob
  query?: Readonly<Record<string, string | number | undefined>>
  signal?: AbortSignal
  /** True for requests that themselves sign in or ask who is signed in. */
  anonymous?: boolean
  /** Lets a short request outlive the page (saving while it closes). */
  keepalive?: boolean
}

/**
 * Sends a request and parses the answer with its schema.
 * @throws ProblemError where the server refuses, NetworkError where no answer comes, UnexpectedAnswerError otherwise.
 */
export async function request<S extends z.ZodType>(
  schema: S,
  method: Method,
  path: string,
  options: RequestOptions = {},
): Promise<z.output<S>> {
  const response = await sendPatiently(method, path, options)
  const body = await readJson(response)
  const parsed = schema.safeParse(body)
  if (!parsed.success) throw new UnexpectedAnswerError(response.status, parsed.error)
  return parsed.data
}

/** As `request`, where the answer carries nothing. */
export async function requestNothing(method: Method, path: string, options: RequestOptions = {}): Promise<void> {
  await sendPatiently(method, path, options)
}

/** As `request`, where the answer is a file. */
export async function requestFile(method: Method, path: string, options: RequestOptions = {}): Promise<Blob> {
  return (await sendPatiently(method, path, options)).blob()
}

/** Sends; renews a stale token once, and asks to sign in again once, before giving the refusal to the caller. */
async function sendPatiently(method: Method, path: string, options: RequestOptions): Promise<Response> {
  try {
    return await send(method, path, options)
  } catch (error) {
    if (!session) throw error
    if (isProblem(error, 'forged-request')) {
      await session.renewToken()
      return send(method, path, options)
    }
    if (options.anonymous) throw error
    if (isProblem(error, 'not-signed-in') && (await session.signInAgain())) return send(method, path, options)
    throw error
  }
}

async function send(method: Method, path: string, options: RequestOptions): Promise<Response> {
  const headers: Record<string, string> = { accept: 'application/json' }
  if (options.body !== undefined) headers['content-type'] = 'application/json'
  if (options.file) headers['content-type'] = options.file.type
  if (method !== 'GET' && session) headers['x-csrf-token'] = session.csrfToken()
  let response: Response
  try {
    response = await fetch(path + queryOf(options.query), {
      method,
      headers,
      credentials: 'same-origin',
      body: options.file ?? (options.body === undefined ? undefined : JSON.stringify(options.body)),
      signal: options.signal,
      keepalive: options.keepalive,
    })
  } catch (error) {
    if (options.signal?.aborted) throw error
    throw new NetworkError(error)
  }
  if (!response.ok) throw await refusalOf(response)
  return response
}

async function refusalOf(response: Response): Promise<Error> {
  const body = await readJson(response).catch(() => undefined)
  const parsed = problemSchema.safeParse(body)
  return parsed.success ? new ProblemError(parsed.data, body) : new UnexpectedAnswerError(response.status)
}

async function readJson(response: Response): Promise<unknown> {
  let text: string
  try {
    text = await response.text()
  } catch (error) {
    throw new NetworkError(error)
  }
  try {
    return JSON.parse(text)
  } catch (error) {
    throw new UnexpectedAnswerError(response.status, error)
  }
}

function queryOf(query: RequestOptions['query']): string {
  const given = Object.entries(query ?? {}).filter(([, value]) => value !== undefined && value !== '')
  return given.length === 0 ? '' : `?${new URLSearchParams(given.map(([name, value]) => [name, String(value)]))}`
}

/** One step of a path, made harmless. */
export const step = (id: string): string => encodeURIComponent(id)
