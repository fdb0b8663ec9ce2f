import type { Draft, DraftStore } from './draft.ts'

const databaseName = 'bayloom-drafts'
/** The document that edits start from is large and seldom changes: it is kept apart and written only when it does. */
const stores = { edits: 'edits', bases: 'bases' } as const

type EditsRecord = Omit<Draft, 'baseDocument'>
interface BaseRecord {
  key: string
  base: number
  document: Draft['baseDocument']
}

function done<T>(request: IDBRequest<T>): Promise<T> {
  return new Promise((resolve, reject) => {
    request.onsuccess = () => resolve(request.result)
    request.onerror = () => reject(request.error ?? new Error('the browser storage does not answer'))
  })
}

function finished(transaction: IDBTransaction): Promise<void> {
  return new Promise((resolve, reject) => {
    transaction.oncomplete = () => resolve()
    const fail = () => reject(transaction.error ?? new Error('the browser storage refused to write'))
    transaction.onerror = fail
    transaction.onabort = fail
  })
}

/** Drafts in the browser's own database: survive a reload, a closed tab and a lost session. */
export function createIdbDrafts(factory: IDBFactory = indexedDB): DraftStore {
  const written = new Map<string, number>()
  const opened = new Promise<IDBDatabase>((resolve, reject) => {
    const request = factory.open(databaseName, 1)
    request.onupgradeneeded = () => {
      for (const name of Object.values(stores)) request.result.createObjectStore(name, { keyPath: 'key' })
    }
    request.onsuccess = () => resolve(request.result)
    request.onerror = () => reject(request.error ?? new Error('the browser storage does not open'))
  })

  async function write(): Promise<{ edits: IDBObjectStore; bases: IDBObjectStore; end: Promise<void> }> {
    const transaction = (await opened).transaction(Object.values(stores), 'readwrite')
    return {
      edits: transaction.objectStore(stores.edits),
      bases: transaction.objectStore(stores.bases),
      end: finished(transaction),
    }
  }

  return {
    async put({ baseDocument, ...record }) {
      const { edits, bases, end } = await write()
      edits.put(record satisfies EditsRecord)
      if (written.get(record.key) !== record.base) {
        bases.put({ key: record.key, base: record.base, document: baseDocument } satisfies BaseRecord)
        written.set(record.key, record.base)
      }
      await end
    },

    async remove(key) {
      const { edits, bases, end } = await write()
      edits.delete(key)
      bases.delete(key)
      written.delete(key)
      await end
    },

    async list(buildId) {
      const transaction = (await opened).transaction(Object.values(stores), 'readonly')
      const edits = (await done(transaction.objectStore(stores.edits).getAll())) as EditsRecord[]
      const bases = (await done(transaction.objectStore(stores.bases).getAll())) as BaseRecord[]
      const documents = new Map(bases.map((base) => [base.key, base]))
      return edits
        .filter((record) => record.buildId === buildId)
        .flatMap((record) => {
          const base = documents.get(record.key)
          return base?.base === record.base ? [{ ...record, baseDocument: base.document }] : []
        })
        .sort((a, b) => b.savedAt - a.savedAt)
    },
  }
}
