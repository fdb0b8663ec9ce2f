import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { parseComment, parseInline, type Block, type Inline } from '#shared/comments/parse.ts'

const person = '3f0c1d9e-0d2a-4c1b-9a5e-1b2c3d4e5f60'
const text = (words: string): Inline => ({ kind: 'text', text: words })

describe('blocks', () => {
  test('paragraphs end at an empty line and keep their line breaks', () => {
    expect(parseComment('one\ntwo\n\nthree')).toEqual([
      { kind: 'paragraph', lines: [[text('one')], [text('two')]] },
      { kind: 'paragraph', lines: [[text('three')]] },
    ])
  })

  test('lists, quotes and fenced code', () => {
    expect(parseComment('- a\n- b\n1. c\n> d\n```\n**not bold**\n```\ne')).toEqual([
      { kind: 'list', isOrdered: false, items: [[text('a')], [text('b')]] },
      { kind: 'list', isOrdered: true, items: [[text('c')]] },
      { kind: 'quote', lines: [[text('d')]] },
      { kind: 'code', text: '**not bold**' },
      { kind: 'paragraph', lines: [[text('e')]] },
    ])
  })

  test('a fence that is never closed holds the rest', () => {
    expect(parseComment('```\na\nb')).toEqual([{ kind: 'code', text: 'a\nb' }])
  })

  test('nothing is nothing', () => expect(parseComment(' \n\n ')).toEqual([]))
})

describe('a line', () => {
  test('carries bold, italic, code, designations, mentions', () => {
    expect(parseInline(`**W4** *feeds* \`in\` C12, @{${person}}`)).toEqual([
      { kind: 'strong', inside: [{ kind: 'ref', ref: 'W4' }] },
      text(' '),
      { kind: 'emphasis', inside: [text('feeds')] },
      text(' '),
      { kind: 'code', text: 'in' },
      text(' '),
      { kind: 'ref', ref: 'C12' },
      text(', '),
      { kind: 'mention', userId: person },
    ])
  })

  test('an address stands without the full stop behind it', () => {
    expect(parseInline('See https://example.org/a?b=1.')).toEqual([
      text('See '),
      { kind: 'link', href: 'https://example.org/a?b=1', text: 'https://example.org/a?b=1' },
      text('.'),
    ])
  })

  test('a link has words of its own', () => {
    expect(parseInline('[sheet](mailto:a@example.org)')).toEqual([
      { kind: 'link', href: 'mailto:a@example.org', text: 'sheet' },
    ])
  })

  test.each([
    '[x](javascript:alert(1))',
    '[x](data:text/html,hi)',
    '[x](  javascript:alert(1))',
    '[x](vbscript:x)',
    '[x](//example.org)',
    '<img src=x onerror=alert(1)>',
    '![x](javascript:alert(1))',
    'SAS3 is a word of 4 letters, xW4 and W45678 are none of ours',
  ])('%s holds no link', (line) => {
    expect(parseInline(line).filter(({ kind }) => kind === 'link' || kind === 'ref')).toEqual([])
  })
})

const links = (blocks: readonly Block[]): string[] => {
  const inLine = (line: readonly Inline[]): string[] =>
    line.flatMap((part) => ('href' in part ? part.href : 'inside' in part ? inLine(part.inside) : []))
  return blocks.flatMap((block) => {
    if (block.kind === 'code') return []
    return (block.kind === 'list' ? block.items : block.lines).flatMap(inLine)
  })
}
const pieces = fc.constantFrom(
  '**', '*', '`', '```', '\n', '\n\n', '> ', '- ', '1. ', '[', '](', ')', '@{', '}', 'javascript:', 'https://', 'mailto:',
  'a', 'W4', ' ', '<script>', person, '\u0000', '\u202e',
) // prettier-ignore

test('whatever is written, no link leads anywhere but to the web or to mail', () => {
  fc.assert(
    fc.property(fc.array(pieces, { maxLength: 60 }), (parts) => {
      for (const href of links(parseComment(parts.join('')))) expect(href).toMatch(/^(https?:\/\/|mailto:)/)
    }),
    { numRuns: 2000 },
  )
})

test.each(['*', '`', '[', '**a', '[a](https://', '@{', '> ', 'W'])('8,000 letters of %s are read at once', (piece) => {
  const started = performance.now()
  parseComment(piece.repeat(8000 / piece.length))
  // Not a measure of speed: what grows with the square or worse would take minutes.
  expect(performance.now() - started).toBeLessThan(2000)
})
