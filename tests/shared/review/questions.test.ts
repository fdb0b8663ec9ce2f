import { readFileSync } from 'node:fs'
import { beforeAll, describe, expect, test } from 'vitest'
import { readBuild } from '#shared/build/read.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { check } from '#shared/check/check.ts'
import { looks, questionIds, type Answer, type QuestionId } from '#shared/review/answer.ts'
import { answerQuestions } from '#shared/review/questions.ts'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { loadCatalogFiles } from '../../../server/services/catalogFiles.ts'
import { powerCatalog, powerDocument } from '../../helpers/powerCatalog.ts'

const catalog = indexCatalog(loadCatalogFiles())
const readExample = (id: string): BuildDocument => {
  const read = readBuild(JSON.parse(readFileSync(`examples/${id}/build.json`, 'utf8')), catalog)
  if (!read.ok) throw new Error(`example ${id} cannot be read`)
  return read.document
}
const answersTo = (document: BuildDocument, index = catalog) => answerQuestions(document, index, check(document, index))
const pick = (answers: readonly Answer[], id: QuestionId): Answer => {
  const answer = answers.find((one) => one.id === id)
  if (!answer) throw new Error(`nobody answers ${id}`)
  return answer
}
const line = (answer: Answer, subject: string) => {
  const found = answer.lines.find((one) => one.subject === subject)
  if (!found) throw new Error(`no line on ${subject}: ${answer.lines.map((one) => one.subject).join(', ')}`)
  return found
}

test.each(['north-room', 'north-room-clean', 'salvage', 'twin-inlets', 'projection-24', 'cutting-room-flash'])(
  'the plan %s answers every question in order, in sentences',
  (id) => {
    const answers = answersTo(readExample(id))
    expect(answers.map((answer) => answer.id)).toEqual([...questionIds])
    for (const { id: question, short, lines } of answers) {
      expect(short).toMatch(/\.$/)
      if (question !== 'findings') expect(lines).not.toHaveLength(0)
      for (const { words } of lines) expect(words).not.toMatch(/undefined|NaN|null|safe/)
    }
    const parts = new Set(readExample(id).parts.map((part) => part.id))
    for (const { lines } of answers)
      for (const one of lines) for (const part of one.parts) expect(parts).toContain(part)
  },
)

describe('the north room as it was found', () => {
  let answers: Answer[]
  beforeAll(() => (answers = answersTo(readExample('north-room'))))

  test('says that the leads are the supply’s own', () => {
    const supply = pick(answers, 'supply')
    expect(supply.short).toContain('460 W')
    expect(looks(supply)).toBe(0)
    expect(line(supply, 'T1').words).toContain('fixed leads')
  })

  test('follows the power of each drive back to the supply', () => {
    const power = pick(answers, 'power')
    expect(line(power, 'C1 to C4').words).toMatch(
      /^T1 lead 1, outlet 1 › W1 › W8; lowest 4\.\d\d V on 5 V at cold start\.$/,
    )
    expect(line(power, 'C8').words).toMatch(/^T1 lead 3, outlet 1 › W4 › W5 › W6 › W9;/)
    expect(line(power, 'C10')).toMatchObject({ look: false })
    expect(line(power, 'C1 to C4')).toMatchObject({ look: true })
  })

  test('counts the drives by model and role', () => {
    const drives = pick(answers, 'drives')
    expect(drives.short).toContain('11 drives: 8 of 3 TB SAS, 7200 rpm')
    expect(line(drives, 'C1 to C7').words).toContain('bays 1 to 7; role data')
  })

  test('names mode and slot of the controllers, and what each reaches', () => {
    const { words } = line(pick(answers, 'controllers'), 'K2')
    expect(words).toContain('always passes drives through')
    expect(words).toContain('in K1 slot 1 (PCIe 2, 16 lanes)')
    expect(words).toContain('8 drives: C1 to C8')
  })

  test('tells where each data cable runs', () => {
    expect(line(pick(answers, 'cables'), 'W8').words).toBe(
      'K2 port A to C1 to C4; forward: one port to several drives; 1 m.',
    )
  })

  test('says that nothing is measured, and what a measurement would turn', () => {
    const figures = pick(answers, 'figures')
    expect(figures.short).toMatch(/^Nothing is measured yet: all \d+ figures are stated or assumed\. \d better figures/)
    expect(figures.lines.filter(({ subject }) => subject === 'Could turn')).not.toHaveLength(0)
  })

  test('counts the findings as the checker does', () => {
    const result = check(readExample('north-room'), catalog)
    const findings = pick(answers, 'findings')
    expect(findings.short).toContain(`${result.counts.fault} faults`)
    expect(findings.lines.filter(({ subject }) => subject === 'Fault')).toHaveLength(result.counts.fault)
  })
})

test('the salvage build asks to look at the foreign leads, the unfed drives, the reversed cable', () => {
  const answers = answersTo(readExample('salvage'))
  const supply = pick(answers, 'supply')
  expect(supply.lines.filter(({ look }) => look).map(({ subject }) => subject)).toEqual(['W3', 'W4'])
  expect(line(supply, 'W3').words).toContain('made for the family "family-a"')
  const power = pick(answers, 'power')
  expect(line(power, 'C6 and C8')).toMatchObject({ words: '12 V and 5 V do not arrive.', look: true })
  expect(line(power, 'C7').words).toBe('5 V does not arrive.')
  expect(line(pick(answers, 'controllers'), 'K2')).toMatchObject({ look: true })
  const cables = pick(answers, 'cables')
  expect(cables.short).toContain('W6 is wired for the other direction')
  expect(line(cables, 'W6')).toMatchObject({ look: true })
})

test('a pin test and a measured figure of one’s own stand among the measured', () => {
  const document = powerDocument({ T1: 'supply-a', W1: 'lead-a', C1: 'drive' }, ['T1.s1 W1.supply', 'W1.out-1 C1.plug'])
  const [supply, lead, drive] = ['T1', 'W1', 'C1'].map((ref) => document.parts.find((part) => part.ref === ref))
  if (!supply || !lead || !drive) throw new Error('a part is missing')
  lead.pinTest = { supply: supply.id, supplyModel: supply.model, by: 'A. Quill', on: '2026-05-02' }
  drive.overrides = { 'load.12V.start.peak_A': { value: 1.8, origin: 'measured', by: 'A. Quill' } }
  const figures = pick(answersTo(document, powerCatalog), 'figures')
  expect(figures.short).toMatch(/^1 of \d+ figures measured/)
  expect(line(figures, 'C1').words).toContain('1.8 A (measured, A. Quill)')
  expect(line(figures, 'W1').words).toBe('every pin measured by A. Quill on 2026-05-02.')
  expect(line(pick(answersTo(document, powerCatalog), 'supply'), 'W1').words).toContain(
    'every pin measured on this supply',
  )
})

test('an accepted finding stands with its reason', () => {
  const document = readExample('north-room')
  const [fault] = check(document, catalog).findings
  if (!fault) throw new Error('nothing found')
  document.accepted = [
    {
      key: fault.key,
      reason: 'ran for years',
      by: 'Irma',
      on: '2026-05-02',
      severity: fault.severity,
      ...(fault.load === undefined ? {} : { load: fault.load }),
    },
  ]
  const { lines, short } = pick(answersTo(document), 'findings')
  expect(short).toContain('1 finding accepted with a reason')
  expect(lines.find(({ subject }) => subject === 'Accepted')?.words).toContain('ran for years (Irma, 2026-05-02)')
})

test('an empty plan says so in every answer and throws nowhere', () => {
  const empty = powerDocument({})
  for (const { lines, short } of answersTo(empty, powerCatalog).filter(
    ({ id }) => !['figures', 'findings'].includes(id),
  )) {
    expect(lines).toEqual([])
    expect(short).toMatch(/^No /)
  }
})
