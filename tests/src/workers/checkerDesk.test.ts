import { describe, expect, it } from 'vitest'
import { check } from '#shared/check/check.ts'
import { createDesk } from '../../../src/workers/checkerDesk.ts'
import type { CheckerAnswer } from '../../../src/workers/messages.ts'
import { documentOf, looseParts, smallCatalog } from '../../shared/build/edits/smallShop.ts'

const catalog = {
  connectorTypes: [...smallCatalog.connectorTypes.values()],
  classes: [],
  models: [...smallCatalog.models.values()],
  sources: [],
}

function bench() {
  const answers: CheckerAnswer[] = []
  const queue: (() => void)[] = []
  const desk = createDesk(
    (message) => answers.push(message),
    (run) => queue.push(run),
    () => 0,
  )
  return { desk, answers, queue, settle: () => queue.splice(0).forEach((run) => run()) }
}

describe("the checker's desk", () => {
  const document = documentOf(looseParts)

  it('answers as the check itself does', () => {
    const { desk, answers, settle } = bench()
    desk.receive({ kind: 'catalog', catalog })
    desk.receive({ kind: 'document', version: 1, document })
    settle()
    expect(answers).toEqual([{ kind: 'result', version: 1, result: check(document, smallCatalog), took_ms: 0 }])
  })

  it('judges only the newest of what stands in the queue', () => {
    const { desk, answers, queue, settle } = bench()
    desk.receive({ kind: 'catalog', catalog })
    desk.receive({ kind: 'document', version: 1, document })
    desk.receive({ kind: 'changes', version: 2, changes: [{ op: 'removePart', id: 'c1' }] })
    desk.receive({ kind: 'changes', version: 3, changes: [{ op: 'removePart', id: 'c2' }] })
    expect(queue).toHaveLength(1)
    settle()
    expect(answers.map((answer) => answer.version)).toEqual([3])
    const [answer] = answers
    expect(answer?.kind === 'result' && answer.result.build.drives).toBe(1)
  })

  it('says that it lost track rather than judging a guess', () => {
    const { desk, answers, settle } = bench()
    desk.receive({ kind: 'catalog', catalog })
    desk.receive({ kind: 'document', version: 1, document })
    desk.receive({ kind: 'changes', version: 3, changes: [{ op: 'removePart', id: 'c1' }] })
    settle()
    expect(answers).toEqual([{ kind: 'lost', version: 3 }])
    desk.receive({ kind: 'document', version: 4, document })
    desk.receive({ kind: 'changes', version: 5, changes: [{ op: 'removePart', id: 'gone' }] })
    settle()
    expect(answers.at(-1)).toEqual({ kind: 'lost', version: 5 })
  })
})
