import { describe, expect, it } from 'vitest'
import { rules } from '../../shared/rules/index.ts'
import type { Rule } from '../../shared/rules/rule.ts'
import { filesBelow, foldersIn, readText } from '../helpers/tree.ts'

const folders = foldersIn('shared/rules')
const sources = new Set((JSON.parse(readText('catalog/sources.json')) as { id: string }[]).map(({ id }) => id))
const tests = filesBelow('tests/shared/rules').filter((file) => file.endsWith('.test.ts'))

const ruleOf = (id: string): Rule => {
  const rule = rules.find(({ meta }) => meta.id === id)
  if (!rule) throw new Error(`${id} is not in shared/rules/index.ts`)
  return rule
}

describe('rules', () => {
  it('are listed, every folder once and in no other way', () => {
    expect(rules.map(({ meta }) => meta.id).sort()).toEqual(folders)
  })

  it.each(folders)('%s has a page that says what its meta says', (id) => {
    const page = readText(`shared/rules/${id}/README.md`)
    const { meta } = ruleOf(id)
    for (const text of [meta.title, meta.finds, meta.why]) expect(page).toContain(text)
  })

  it.each(folders)('%s has a test named after it', (id) => {
    expect(tests.some((file) => file.endsWith(`/${id}.test.ts`) || file.includes(`/${id}/`))).toBe(true)
  })

  it.each(folders)('%s names sources that the catalog knows, or is common practice', (id) => {
    const { meta } = ruleOf(id)
    expect(meta.sources.length > 0 || meta.commonPractice === true).toBe(true)
    expect(meta.sources.filter((source) => !sources.has(source))).toEqual([])
  })

  it.each(folders)('%s says what is wrong without blame', (id) => {
    const { meta } = ruleOf(id)
    expect(meta.severities.length).toBeGreaterThan(0)
    expect(`${meta.title} ${meta.finds} ${meta.why}`).not.toMatch(/!|\byou (must|should have|forgot)\b/i)
  })
})
