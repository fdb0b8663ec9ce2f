import type { Message } from '#shared/contract/mailbox.ts'

/** How each state is called, for lists and for the choice of what to show. */
export const stateNames: Readonly<Record<Message['state'], string>> = {
  queued: 'waiting',
  sent: 'sent',
  failed: 'given up',
  dropped: 'not sent',
}

const tries = (count: number): string => `${count} ${count === 1 ? 'try' : 'tries'}`

/** The state with what matters about it. */
export function stateWords({ state, attempts }: Pick<Message, 'state' | 'attempts'>): string {
  if (state === 'failed') return `given up after ${tries(attempts)}`
  if (state === 'queued' && attempts > 0) return `waiting after ${tries(attempts)}`
  return stateNames[state]
}
