import { randomUUID } from 'node:crypto'
import type { Change, Edit } from '#shared/build/changes.ts'
import type { BuildDocumentInput } from '#shared/build/document.ts'
import type { ModelInput } from '#shared/catalog/model.ts'

/** A cable that stands in no catalog, so that tests of the server do not hang on one. */
export const testCable: ModelInput = {
  id: 'test-data-cable',
  kind: 'cable',
  name: 'Data cable of the tests',
  cable: { length_mm: { value: 500, origin: 'guess' } },
  connectors: [
    { id: 'a', label: 'A', type: 'sata-data-receptacle' },
    { id: 'b', label: 'B', type: 'sata-data-receptacle' },
  ],
}

/** A document of so many cables, without joints. */
export const cablesDocument = (name: string, cables: number): BuildDocumentInput => ({
  format: 'bayloom-build',
  version: 1,
  name,
  models: [testCable],
  parts: Array.from({ length: cables }, (_, i) => ({
    id: `p${i + 1}`,
    model: testCable.id,
    ref: `W${i + 1}`,
    note: `cable ${i + 1}`,
  })),
  joints: [],
})

export const edit = (label: string, ...changes: Change[]): Edit => ({ label, changes })
export const addCable = (number: number): Change => ({
  op: 'addPart',
  part: { id: `p${number}`, model: testCable.id, ref: `W${number}` },
})
export const note = (id: string, text: string): Change => ({ op: 'updatePart', id, patch: { note: text } })
export const serial = (id: string, text: string): Change => ({ op: 'updatePart', id, patch: { serial: text } })

export const save = (base: number, ...edits: Edit[]) => ({ base, requestId: randomUUID(), edits })
