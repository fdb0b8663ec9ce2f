import { describe, expect, it } from 'vitest'
import { filesBelow, readText } from '../helpers/tree.ts'

const own = 'tests/conventions/words.test.ts'
const texts = filesBelow()
  .filter((file) => file !== own && file !== 'package-lock.json')
  .filter((file) => /\.(ts|mjs|js|vue|css|html|json|md|example)$|^\.ci\/run$|^\.npmrc$/.test(file))

/** Lines of these files that match. */
const linesWith = (pattern: RegExp, files: readonly string[]): string[] =>
  files.flatMap((file) =>
    readText(file)
      .split('\n')
      .flatMap((line, index) => (pattern.test(line) ? [`${file}:${index + 1}: ${line.trim().slice(0, 120)}`] : [])),
  )

const unfinished = /\b(TODO|FIXME|XXX|HACK)\b|[Ll]orem ipsum/
const silenced = /eslint-disable|@ts-ignore|@ts-nocheck|@ts-expect-error/
const personal = /(^|[\s'"`(=])\/(home|root|work|Users)\/\w|registry\.npmjs\.org/
const promise = /\b(is|are|be|perfectly|completely) safe\b(?! (integer|to repeat))/i

describe('words that have no place here', () => {
  it('looks at the whole project', () => expect(texts.length).toBeGreaterThan(100))
  it('nothing is left to do later', () => expect(linesWith(unfinished, texts)).toEqual([]))
  it('no check is switched off in a comment', () => expect(linesWith(silenced, texts)).toEqual([]))
  it('nothing names a folder of one machine', () => expect(linesWith(personal, texts)).toEqual([]))
  it('nothing promises safety: it is "within the stated limits"', () =>
    expect(
      linesWith(
        promise,
        texts.filter((file) => /^(src|shared|server|catalog|examples)\//.test(file)),
      ),
    ).toEqual([]))
})
