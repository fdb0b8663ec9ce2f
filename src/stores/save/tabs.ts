const tabName = 'bayloom.tab'

/**
 * This tab's own name for drafts. It survives a reload; a tab that was duplicated gets another, because the name is
 * held by a lock as long as the page lives.
 */
export async function claimTab(): Promise<string> {
  const known = sessionStorage.getItem(tabName)
  if (known && (await hold(known))) return known
  const fresh = crypto.randomUUID()
  sessionStorage.setItem(tabName, fresh)
  await hold(fresh)
  return fresh
}

const lockOf = (tab: string): string => `bayloom-tab-${tab}`
const held = new Set<string>()

/** Takes the lock for as long as the page lives; false where another page has it. */
function hold(tab: string): Promise<boolean> {
  if (held.has(tab)) return Promise.resolve(true)
  return new Promise((resolve, reject) => {
    navigator.locks
      .request(lockOf(tab), { ifAvailable: true }, (lock) => {
        if (lock) held.add(tab)
        resolve(lock !== null)
        return lock ? new Promise<never>(() => {}) : undefined
      })
      .catch(reject)
  })
}

/** True where the page that wrote a draft is gone. */
export async function isAbandoned(tab: string): Promise<boolean> {
  if (held.has(tab)) return false
  return navigator.locks.request(lockOf(tab), { ifAvailable: true }, (lock) => lock !== null)
}

export const draftKey = (tab: string, buildId: string): string => `${tab}:${buildId}`
export const tabOf = (key: string): string => key.split(':')[0] ?? key
