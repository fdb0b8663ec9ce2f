import { liveEvents, type LiveEvent, type LiveEventName } from '#shared/contract/live.ts'

export type StreamHandlers = { [Name in LiveEventName]?: (data: LiveEvent<Name>) => void } & {
  /** The connection stands, or was lost. */
  onConnected?: (connected: boolean) => void
}

/** A hidden page gives its connection up after this long: browsers allow only a few to one server. */
const hiddenGrace_ms = 30_000
const firstRetry_ms = 2_000
const longestRetry_ms = 60_000

/**
 * Holds a stream of events open for as long as the page is looked at. The browser itself comes back after a short break
 * and says which line it heard last; where it gives up, this does the same with `after`. Nothing is missed either way.
 */
export function openEventStream(address: (after: number | null) => string, handlers: StreamHandlers): () => void {
  let source: EventSource | null = null
  let after: number | null = null
  let retry_ms = firstRetry_ms
  let timer: ReturnType<typeof setTimeout> | undefined
  let over = false

  function hear<Name extends LiveEventName>(from: EventSource, name: Name): void {
    from.addEventListener(name, (event: MessageEvent<string>) => {
      const parsed = liveEvents[name].safeParse(JSON.parse(event.data))
      if (!parsed.success || source !== from) return
      const data = parsed.data as LiveEvent<Name>
      if ('lastId' in data) after = data.lastId
      if (event.lastEventId !== '') after = Number(event.lastEventId)
      if (name === 'end') leave(data as LiveEvent<'end'>)
      ;(handlers[name] as ((heard: LiveEvent<Name>) => void) | undefined)?.(data)
    })
  }

  function connect(): void {
    clearTimeout(timer)
    if (over || source || typeof EventSource === 'undefined') return
    const next = new EventSource(address(after))
    source = next
    for (const name of Object.keys(liveEvents) as LiveEventName[]) hear(next, name)
    next.onopen = () => {
      retry_ms = firstRetry_ms
      handlers.onConnected?.(true)
    }
    next.onerror = () => {
      handlers.onConnected?.(false)
      if (next.readyState !== EventSource.CLOSED || source !== next) return
      source = null
      timer = setTimeout(connect, retry_ms)
      retry_ms = Math.min(longestRetry_ms, retry_ms * 2)
    }
  }

  function disconnect(): void {
    clearTimeout(timer)
    source?.close()
    source = null
    handlers.onConnected?.(false)
  }

  /** Pushed out by newer tabs, a page comes back when it is looked at anew; without access it does not. */
  function leave({ reason }: LiveEvent<'end'>): void {
    if (reason === 'too-many') disconnect()
    else stop()
  }

  function stop(): void {
    over = true
    disconnect()
  }

  const onVisibility = (): void => {
    clearTimeout(timer)
    if (document.visibilityState === 'hidden') timer = setTimeout(disconnect, hiddenGrace_ms)
    else connect()
  }
  document.addEventListener('visibilitychange', onVisibility)
  window.addEventListener('online', connect)
  connect()

  return () => {
    document.removeEventListener('visibilitychange', onVisibility)
    window.removeEventListener('online', connect)
    stop()
  }
}
