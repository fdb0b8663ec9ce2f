import { ipKeyGenerator, MemoryStore } from 'express-rate-limit'
import type { Config } from '../config.ts'
import { Refusal } from '../services/refusal.ts'
import { hashToken } from '../services/tokens.ts'
import type { Call } from './call.ts'

interface Limit {
  /** Whom the tries are counted for. */
  per: 'address' | 'account' | 'link'
  most: number
  minutes: number
  /** Count only tries that were refused. */
  failuresOnly?: boolean
}

/** Every rate limit of the installation, by the name that routes give. */
export const rateLimits = {
  'sign-in': [
    { per: 'address', most: 50, minutes: 15, failuresOnly: true },
    { per: 'account', most: 10, minutes: 15, failuresOnly: true },
  ],
  register: [
    { per: 'address', most: 30, minutes: 60 },
    { per: 'account', most: 10, minutes: 60 },
  ],
  'ask-reset': [
    { per: 'address', most: 20, minutes: 60 },
    { per: 'account', most: 5, minutes: 60 },
  ],
  'use-link': [{ per: 'address', most: 60, minutes: 15, failuresOnly: true }],
  'open-link': [{ per: 'address', most: 120, minutes: 15 }],
  'join-link': [
    { per: 'address', most: 20, minutes: 15 },
    { per: 'link', most: 60, minutes: 15 },
  ],
  'change-password': [{ per: 'account', most: 10, minutes: 15, failuresOnly: true }],
  'export-account': [{ per: 'account', most: 10, minutes: 60 }],
  invite: [
    { per: 'address', most: 120, minutes: 60 },
    { per: 'account', most: 60, minutes: 60 },
  ],
  comment: [{ per: 'address', most: 240, minutes: 15 }],
  check: [{ per: 'account', most: 240, minutes: 1 }],
  upload: [{ per: 'account', most: 60, minutes: 15 }],
  paper: [{ per: 'account', most: 60, minutes: 1 }],
  presence: [{ per: 'account', most: 240, minutes: 1 }],
} as const satisfies Record<string, readonly Limit[]>
export type RateLimitName = keyof typeof rateLimits

/** Counts tries and refuses the one too many. Counts live in memory and start anew with the server. */
export interface RateLimiter {
  count(call: Call): Promise<void>
  /** Takes back what `count` added where only failures count and this was none. */
  succeeded(call: Call): Promise<void>
  close(): void
}

export function makeRateLimiter(name: RateLimitName, config: Config): RateLimiter {
  const counters = rateLimits[name].map((limit: Limit) => {
    const store = new MemoryStore()
    store.init({ windowMs: limit.minutes * 60_000 } as Parameters<MemoryStore['init']>[0])
    return { limit, store, most: limit.most * config.rateLimitFactor }
  })
  return {
    async count(call) {
      for (const { limit, store, most } of counters) {
        const { totalHits, resetTime } = await store.increment(keyOf(limit, call))
        if (totalHits <= most) continue
        const wait_ms = (resetTime?.getTime() ?? Date.now() + limit.minutes * 60_000) - Date.now()
        throw new Refusal('too-many-requests', { retryAfter_s: Math.max(1, Math.ceil(wait_ms / 1000)) })
      }
    },
    async succeeded(call) {
      for (const { limit, store } of counters) if (limit.failuresOnly) await store.decrement(keyOf(limit, call))
    },
    close() {
      for (const { store } of counters) store.shutdown()
    },
  }
}

/** An account is whoever is signed in or came by a link, else the e-mail address that the request is about. */
function keyOf(limit: Limit, call: Call): string {
  if (limit.per === 'address') return ipKeyGenerator(call.request.ip ?? '')
  if (limit.per === 'link') return hashToken((call.params as { token?: string }).token ?? '')
  if (call.actor) return call.actor.id
  if (call.guest) return call.guest.id
  const { body } = call
  return typeof body === 'object' && body !== null && 'email' in body ? String(body.email) : ''
}
