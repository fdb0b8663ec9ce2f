import { describe, expect, it } from 'vitest'
import { settingSchemas } from '../../server/config.ts'
import { filesBelow, readText } from '../helpers/tree.ts'

const described = [...readText('.env.example').matchAll(/^#?([A-Z][A-Z_]+)=/gm)].map(([, name]) => name)

/** Settings that only set-up reads, from its own sources. */
const readBySetup = filesBelow('server/setup')
  .flatMap((file) =>
    [...readText(file).matchAll(/process\.env(?:\.|\[')([A-Z][A-Z_]+)/g)].map(([, name]) => name ?? ''),
  )
  .filter((name) => name !== 'PATH')

describe('settings', () => {
  it('are described in .env.example, every one and no other', () => {
    const read = new Set([...Object.keys(settingSchemas), ...readBySetup])
    expect([...described].sort()).toEqual([...read].sort())
  })
})
