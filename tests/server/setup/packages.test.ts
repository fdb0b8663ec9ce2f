import { describe, expect, it } from 'vitest'
import { sameAsLocked } from '../../../server/setup/packages.mjs'

const locked = {
  '': {},
  'node_modules/a': { version: '1.0.0' },
  'node_modules/b': { version: '2.0.0', optional: true },
}

describe('whether the packages are there as locked', () => {
  it.each([
    ['all there', { 'node_modules/a': { version: '1.0.0' }, 'node_modules/b': { version: '2.0.0' } }, true],
    ['optional one left out', { 'node_modules/a': { version: '1.0.0' } }, true],
    ['needed one missing', { 'node_modules/b': { version: '2.0.0' } }, false],
    ['needed one older', { 'node_modules/a': { version: '0.9.0' } }, false],
    [
      'optional one of another version',
      { 'node_modules/a': { version: '1.0.0' }, 'node_modules/b': { version: '1.0.0' } },
      false,
    ],
    ['nothing there', {}, false],
  ])('%s', (_name, installed, same) => {
    expect(sameAsLocked(locked, installed)).toBe(same)
  })
})
