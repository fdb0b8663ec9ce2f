import { describe, expect, it } from 'vitest'
import { reaches } from '../../../server/setup/nodeVersion.mjs'

describe('the version of Node.js', () => {
  it.each([
    ['20.19.0', true],
    ['20.20.2', true],
    ['22.0.0', true],
    ['20.18.3', false],
    ['18.20.0', false],
    ['9.99.0', false],
  ])('%s reaches >=20.19: %s', (version, enough) => {
    expect(reaches(version, '>=20.19')).toBe(enough)
  })
})
