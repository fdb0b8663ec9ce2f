import { parseComment, type Block, type Inline } from './parse.ts'

/** Ids of the people that a comment mentions, each once, in order. */
export function mentionsIn(source: string): string[] {
  return [...new Set([...source.matchAll(/@\{([0-9a-f-]{36})\}/g)].flatMap((match) => match[1] ?? []))]
}

/** The beginning of a comment as one line of plain text, for lists and mails. `nameOf` names who is mentioned. */
export function excerptOf(source: string, nameOf: (userId: string) => string | undefined, most = 160): string {
  const text = parseComment(source)
    .map((block) => blockText(block, nameOf))
    .join(' ')
    .replace(/\s+/g, ' ')
    .trim()
  return text.length <= most ? text : `${text.slice(0, most - 1).trimEnd()}…`
}

function blockText(block: Block, nameOf: (userId: string) => string | undefined): string {
  const inline = (line: readonly Inline[]) => line.map((part) => inlineText(part, nameOf)).join('')
  switch (block.kind) {
    case 'code':
      return block.text
    case 'list':
      return block.items.map(inline).join('; ')
    case 'paragraph':
    case 'quote':
      return block.lines.map(inline).join(' ')
  }
}

function inlineText(part: Inline, nameOf: (userId: string) => string | undefined): string {
  switch (part.kind) {
    case 'text':
    case 'code':
    case 'link':
      return part.text
    case 'strong':
    case 'emphasis':
      return part.inside.map((one) => inlineText(one, nameOf)).join('')
    case 'mention':
      return `@${nameOf(part.userId) ?? 'former member'}`
    case 'ref':
      return part.ref
  }
}
