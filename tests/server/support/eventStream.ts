import { get, type IncomingMessage } from 'node:http'
import { liveEvents, type LiveEvent, type LiveEventName } from '#shared/contract/live.ts'
import type { Client } from './api.ts'

interface Heard {
  name: string
  data: unknown
  id: string | undefined
}

/** A stream of events as a browser reads it, with everything heard so far kept. */
export interface EventReader {
  status: number
  headers: IncomingMessage['headers']
  /** Waits for an event of this name that holds; events heard before count too, each once. */
  next<Name extends LiveEventName>(
    name: Name,
    holds?: (data: LiveEvent<Name>) => boolean,
  ): Promise<LiveEvent<Name> & { eventId?: string | undefined }>
  /** Names of what was heard and not taken yet. */
  left(): string[]
  /** Resolves when the server ends the stream. */
  ended: Promise<void>
  close(): void
}

/** Opens a stream with the client's cookies. */
export function openEvents(
  url: string,
  client: Pick<Client, 'cookies'>,
  path: string,
  headers: Record<string, string> = {},
): Promise<EventReader> {
  const cookie = [...client.cookies].map(([name, value]) => `${name}=${value}`).join('; ')
  return new Promise((resolve, reject) => {
    const request = get(
      url + path,
      { headers: { accept: 'text/event-stream', 'accept-encoding': 'gzip', cookie, ...headers } },
      (response) => resolve(readEvents(response, () => request.destroy())),
    )
    request.on('error', reject)
  })
}

function readEvents(response: IncomingMessage, destroy: () => void): EventReader {
  const heard: Heard[] = []
  const waiting = new Set<() => void>()
  let text = ''
  response.setEncoding('utf8')
  let over = false
  response.on('data', (chunk: string) => {
    text += chunk
    const blocks = text.split('\n\n')
    text = blocks.pop() ?? ''
    for (const block of blocks) {
      const field = (name: string) => new RegExp(`^${name}: (.*)$`, 'm').exec(block)?.[1]
      const name = field('event')
      if (name !== undefined) heard.push({ name, data: JSON.parse(field('data') ?? 'null'), id: field('id') })
    }
    for (const look of waiting) look()
  })
  const ended = new Promise<void>((resolve) => {
    response.on('close', () => {
      over = true
      for (const look of waiting) look()
      resolve()
    })
    response.on('error', () => resolve())
  })
  return {
    status: response.statusCode ?? 0,
    headers: response.headers,
    next: (name, holds = () => true) =>
      new Promise((resolve, reject) => {
        const look = () => {
          const i = heard.findIndex(
            (one) => one.name === name && holds(liveEvents[name].parse(one.data) as LiveEvent<typeof name>),
          )
          const [found] = i < 0 ? [] : heard.splice(i, 1)
          if (!found) return over ? reject(new Error(`the stream ended without "${name}"`)) : undefined
          waiting.delete(look)
          const data = liveEvents[name].parse(found.data) as LiveEvent<typeof name>
          resolve(Object.assign(data, { eventId: found.id }))
        }
        waiting.add(look)
        look()
      }),
    left: () => heard.map((one) => one.name),
    ended,
    close: destroy,
  }
}
