import type { Response } from 'express'
import type { LiveEvent, LiveEventName } from '#shared/contract/live.ts'
import type { Author } from '#shared/contract/activity.ts'
import type { Reader } from './access.ts'

/** A reader this far behind is let go: their browser comes back and asks for what it missed. */
const mostWaiting_bytes = 1_000_000
/** How long a browser waits before it comes back. */
const comeBack_ms = 1_500

/** One connection that a browser holds open for events. */
export interface Stream {
  readonly reader: Reader
  readonly by: Author
  readonly address: string
  readonly buildId: string | null
  readonly tab: string | null
  /** Number of the last line of activity that was sent. */
  lastId: number
  /** Set while lines are read from the table, so that they are not also sent as they are heard. */
  catchingUp: Promise<void> | null
  again: boolean
  send<Name extends LiveEventName>(name: Name, data: LiveEvent<Name>, id?: number): void
  beat(): void
  close(): void
}

/** Headers under which nothing on the way gathers, changes or keeps what is sent. */
export const streamHeaders: Readonly<Record<string, string>> = {
  'Content-Type': 'text/event-stream; charset=utf-8',
  'Cache-Control': 'no-store, no-transform',
  'X-Accel-Buffering': 'no',
}

/** Begins to write events to a response (the event stream format of the HTML standard). */
export function openStream(
  response: Response,
  about: Pick<Stream, 'reader' | 'by' | 'address' | 'buildId' | 'tab' | 'lastId'>,
): Stream {
  const write = (text: string): void => {
    if (response.writableEnded || response.destroyed) return
    if (response.writableLength > mostWaiting_bytes) response.destroy()
    else response.write(text)
  }
  response.flushHeaders()
  write(`retry: ${comeBack_ms}\n\n`)
  return {
    ...about,
    catchingUp: null,
    again: false,
    send: (name, data, id) =>
      write(`${id === undefined ? '' : `id: ${id}\n`}event: ${name}\ndata: ${JSON.stringify(data)}\n\n`),
    beat: () => write(': here\n\n'),
    close: () => void response.end(),
  }
}
