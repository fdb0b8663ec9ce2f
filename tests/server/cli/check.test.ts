import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'
import { buildDocumentSchema } from '#shared/build/document.ts'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import { checkResultSchema } from '#shared/check/result.ts'
import { runCheck } from '../../../server/cli/runCheck.ts'
import { loadCatalogFiles } from '../../../server/services/catalogFiles.ts'
import { root } from '../../../server/setup/paths.mjs'

const folder = mkdtempSync(join(tmpdir(), 'bayloom-check-'))
afterAll(() => rmSync(folder, { recursive: true }))

/** A build without any fault: two empty cases. */
const sound = {
  format: 'bayloom-build',
  version: 1,
  name: 'Cases on a shelf',
  parts: [
    { id: 'p1', model: 'case-tower-8', ref: 'A1' },
    { id: 'p2', model: 'case-tower-8', ref: 'A2' },
  ],
  joints: [],
}
/** A drive that nothing reaches. */
const faulty = {
  ...sound,
  name: 'One drive',
  parts: [
    ...sound.parts,
    { id: 'p3', model: 'hdd-35-7200-sas-4tb', ref: 'C1', serial: 'RV1', bay: { case: 'p1', slot: 2 } },
  ],
}

function write(name: string, content: unknown): string {
  const file = join(folder, name)
  const text = typeof content === 'string' || Buffer.isBuffer(content) ? content : JSON.stringify(content)
  writeFileSync(file, text)
  return file
}

async function run(words: readonly string[], input = '', width = 100) {
  const out: string[] = []
  const errors: string[] = []
  async function* stream() {
    yield Buffer.from(input)
  }
  const code = await runCheck(words, {
    input: stream(),
    say: (text) => out.push(text),
    complain: (text) => errors.push(text),
    width,
  })
  return { code, out: out.join('\n'), errors: errors.join('\n') }
}

describe('exit codes', () => {
  it('0 where nothing is at fault, 1 where something is', async () => {
    expect(await run([write('sound.json', sound)])).toMatchObject({ code: 0, errors: '' })
    const bad = await run([write('faulty.json', faulty)])
    expect(bad.code).toBe(1)
    expect(bad.out).toContain('C1 has no data connection yet')
  })

  it('0 where a person accepted all that is at fault', async () => {
    const catalog = indexCatalog(loadCatalogFiles())
    const { findings } = check(buildDocumentSchema.parse(faulty), catalog)
    const accepted = findings.map(({ key, severity }) => ({
      key,
      severity,
      reason: 'still to come',
      by: 'Ines',
      on: '2026-11-30',
    }))
    const answer = await run([write('accepted.json', { ...faulty, accepted })])
    expect(answer.code).toBe(0)
    expect(answer.out).toContain('(accepted)')
    expect(answer.out).toContain('Accepted by Ines on 2026-11-30: still to come')
  })

  it('the worst of several files', async () => {
    const [good, bad] = [write('a.json', sound), write('b.json', faulty)]
    expect((await run([good, bad])).code).toBe(1)
    const all = await run([good, join(folder, 'missing.json'), bad])
    expect(all.code).toBe(2)
    expect(all.out).toContain('Cases on a shelf')
    expect(all.out).toContain('One drive')
  })
})

const withJoint = (joint: unknown) => ({ ...faulty, joints: [joint] })
const nested = `{"format":"bayloom-build","version":1,"name":"x","parts":${'['.repeat(1_000_000)}${']'.repeat(1_000_000)},"joints":[]}`
const deep = `${'{"a":'.repeat(400_000)}1${'}'.repeat(400_000)}`
const negative = {
  ...sound,
  parts: [
    {
      ...sound.parts[0],
      id: 'w',
      ref: 'W1',
      model: 'cable-sata',
      overrides: { 'cable.length_mm': { value: -1, origin: 'guess' } },
    },
  ],
}

describe('what cannot be read is refused with its place and reason', () => {
  it.each([
    ['not JSON', 'hello', /not JSON/],
    ['nothing', '', /not JSON/],
    ['half a file', JSON.stringify(sound).slice(0, 60), /not JSON/],
    ['a list', [], /a build document is a JSON object/],
    ['another format', { format: 'other' }, /format: expected "bayloom-build"/],
    ['a newer version', { ...sound, version: 99 }, /version: version 99 is newer/],
    [
      'an unknown model',
      { ...sound, parts: [{ id: 'p', ref: 'C1', model: 'no-such' }] },
      /parts\[0\]\.model: no model "no-such"/,
    ],
    [
      'a joint to nowhere',
      withJoint({ id: 'j', a: { part: 'p3', connector: 'plug' }, b: { part: 'nobody', connector: 'x' } }),
      /joints\[0\]\.b\.part: no part "nobody"/,
    ],
    [
      'a joint to no connector',
      withJoint({ id: 'j', a: { part: 'p3', connector: 'plug' }, b: { part: 'p1', connector: 'x' } }),
      /joints\[0\]\.b\.connector: A1 .* has no connector "x"/,
    ],
    ['a negative length', negative, /parts\[0\]\.overrides\.cable\.length_mm\.value|parts\[0\]\.overrides\..*value/],
    ['an unknown field', { ...sound, colour: 'red' }, /colour: unknown field/],
    [
      'an unknown field of a part',
      { ...sound, parts: [{ ...sound.parts[0], colour: 'red' }] },
      /parts\[0\]\.colour: unknown field/,
    ],
    ['two megabytes of nested lists', nested, /nested deeper than/],
    ['two megabytes of nested objects', deep, /nested deeper than/],
    ['binary', Buffer.from([0xff, 0xfe, 0x00, 0x80, 0x81]), /not text/],
  ])('%s', async (name, content, reason) => {
    const file = write(`${name.replaceAll(' ', '-')}.json`, content)
    const { code, out, errors } = await run([file])
    expect(code).toBe(2)
    expect(out).toBe('')
    expect(errors).toMatch(reason)
    expect(errors).toContain(file)
    expect(errors).not.toMatch(/\n\s+at /)
  })

  it('a missing file, a folder', async () => {
    expect(await run([join(folder, 'missing.json')])).toMatchObject({ code: 2, out: '' })
    expect((await run([join(folder, 'missing.json')])).errors).toContain('no such file')
    expect((await run([folder])).errors).toContain('is a folder')
  })

  it('more than a document can hold', async () => {
    const { code, errors } = await run([write('huge.json', Buffer.alloc(65 * 1024 * 1024, ' '))])
    expect(code).toBe(2)
    expect(errors).toContain('larger than 64 MB')
  })

  it('at most some problems of one file, and how many more', async () => {
    const many = Array.from({ length: 60 }, (_, i) => ({ id: `p${i}`, ref: `C${i + 1}`, model: 'no-such' }))
    const { errors } = await run([write('many.json', { ...sound, parts: many })])
    expect(errors.split('\n')).toHaveLength(21)
    expect(errors).toContain('40 more')
  })
})

describe('words of the command line', () => {
  it('says how it is used', async () => {
    expect(await run(['--help'])).toMatchObject({ code: 0, errors: '' })
    for (const words of [[], ['--no-such'], ['--json=3', 'x']]) {
      const { code, out, errors } = await run(words)
      expect(code).toBe(2)
      expect(out).toBe('')
      expect(errors).toContain('npm run check -- FILE')
    }
  })

  it('"-" reads the standard input', async () => {
    expect((await run(['-'], JSON.stringify(faulty))).code).toBe(1)
    expect((await run(['-'], '{')).errors).toContain('standard input: not JSON')
  })
})

describe('--json', () => {
  it('prints the answer of the checker and nothing else', async () => {
    const { out, errors } = await run([write('faulty.json', faulty), '--json'])
    expect(errors).toBe('')
    const printed: unknown = JSON.parse(out)
    expect(checkResultSchema.parse(printed)).toEqual(printed)
    expect(printed).toEqual(
      JSON.parse(JSON.stringify(check(buildDocumentSchema.parse(faulty), indexCatalog(loadCatalogFiles())))),
    )
  })

  it('prints a list for several files, null where one cannot be read', async () => {
    const { out, code } = await run(['--json', write('a.json', sound), join(folder, 'missing.json')])
    expect(code).toBe(2)
    expect(JSON.parse(out)).toMatchObject([{ build: { name: 'Cases on a shelf' } }, null])
  })
})

describe('the text', () => {
  it.each([40, 80, 120])('keeps to a width of %s', async (width) => {
    const { out } = await run([write('faulty.json', faulty)], '', width)
    expect(Math.max(...out.split('\n').map((line) => line.length))).toBeLessThanOrEqual(width)
  })

  it('keeps control characters of a document away from the terminal', async () => {
    const name = 'red \u001b[31mname\u0007'
    const { out } = await run([write('control.json', { ...faulty, name })])
    expect(out).toContain('red [31mname')
    expect(out).not.toMatch(/[\u0007\u001b]/)
  })
})

describe('the command itself', () => {
  const start = (words: readonly string[]) =>
    spawnSync(process.execPath, ['--import', 'tsx', 'server/cli/check.ts', ...words], { cwd: root, encoding: 'utf8' })

  it('ends with the code of the check', () => {
    const bad = start([write('faulty.json', faulty), '--json'])
    expect(bad.status).toBe(1)
    expect(JSON.parse(bad.stdout)).toMatchObject({ worst: 'fault' })
    const unreadable = start([join(folder, 'missing.json')])
    expect([unreadable.status, unreadable.stdout]).toEqual([2, ''])
  })
})
