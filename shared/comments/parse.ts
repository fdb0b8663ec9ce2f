/** A stretch of text within a line. */
export type Inline =
  | { kind: 'text'; text: string }
  | { kind: 'code'; text: string }
  | { kind: 'strong' | 'emphasis'; inside: Inline[] }
  | { kind: 'link'; href: string; text: string }
  | { kind: 'mention'; userId: string }
  /** A reference designation, as "W4": leads to the part where there is one of that name. */
  | { kind: 'ref'; ref: string }

/** One block of a comment. */
export type Block =
  | { kind: 'paragraph'; lines: Inline[][] }
  | { kind: 'quote'; lines: Inline[][] }
  | { kind: 'list'; isOrdered: boolean; items: Inline[][] }
  | { kind: 'code'; text: string }

/**
 * Reads a comment into blocks: paragraphs, `-` and `1.` lists, `>` quotes, fenced code; in a line **bold**, *italic*, `code`,
 * addresses, mentions and designations. Everything else is plain text: there is no markup that could carry a script, and
 * nothing is ever handed on as HTML. Time grows with the length of the text.
 */
export function parseComment(source: string): Block[] {
  const blocks: Block[] = []
  const lines = source.replace(/\r\n?/g, '\n').split('\n')
  for (let at = 0; at < lines.length;) {
    const line = lines[at] ?? ''
    if (line.trim() === '') at++
    else if (line.startsWith('```')) at = readFence(lines, at, blocks)
    else at = readBlock(lines, at, kindOf(line), blocks)
  }
  return blocks
}

type LineKind = 'paragraph' | 'quote' | 'bullet' | 'number'

const marks: Readonly<Record<Exclude<LineKind, 'paragraph'>, RegExp>> = {
  quote: /^> ?/,
  bullet: /^[-*] +/,
  number: /^\d{1,3}[.)] +/,
}

function kindOf(line: string): LineKind {
  if (marks.quote.test(line)) return 'quote'
  if (marks.bullet.test(line)) return 'bullet'
  return marks.number.test(line) ? 'number' : 'paragraph'
}

/** Takes the fenced lines; a fence that is never closed holds the rest. */
function readFence(lines: readonly string[], from: number, into: Block[]): number {
  let end = from + 1
  while (end < lines.length && !(lines[end] ?? '').startsWith('```')) end++
  into.push({ kind: 'code', text: lines.slice(from + 1, end).join('\n') })
  return end + 1
}

/** Takes the lines of one kind that follow each other. */
function readBlock(lines: readonly string[], from: number, kind: LineKind, into: Block[]): number {
  let end = from
  const inside: Inline[][] = []
  for (; end < lines.length; end++) {
    const line = lines[end] ?? ''
    if (line.trim() === '' || line.startsWith('```') || kindOf(line) !== kind) break
    inside.push(parseInline(kind === 'paragraph' ? line.trim() : line.replace(marks[kind], '')))
  }
  if (kind === 'paragraph' || kind === 'quote') into.push({ kind, lines: inside })
  else into.push({ kind: 'list', isOrdered: kind === 'number', items: inside })
  return end
}

/** Alternatives in order of precedence; none of them can look far back, so a hostile line costs no more than a plain one. */
const inlineMarks = new RegExp(
  [
    '`(?<code>[^`]{1,500})`',
    String.raw`\*\*(?<strong>[^*]{1,2000})\*\*`,
    String.raw`\*(?<emphasis>[^*\s][^*]{0,2000})\*`,
    String.raw`\[(?<label>[^\]\[]{1,300})\]\((?<target>(?:https?:\/\/|mailto:)[^\s()<>]{1,1000})\)`,
    String.raw`(?<address>https?:\/\/[^\s<>"'()*]{1,1000}[^\s<>"'()*.,;:!?])`,
    String.raw`@\{(?<mention>[0-9a-f-]{36})\}`,
    String.raw`(?<![\p{L}\p{N}_])(?<ref>[A-Z]{1,2}\d{1,4})(?![\p{L}\p{N}_])`,
  ].join('|'),
  'gu',
)

/** Reads one line. */
export function parseInline(line: string, depth = 0): Inline[] {
  const found: Inline[] = []
  let done = 0
  for (const match of line.matchAll(inlineMarks)) {
    if (match.index > done) found.push({ kind: 'text', text: line.slice(done, match.index) })
    found.push(toInline(match, depth))
    done = match.index + match[0].length
  }
  if (done < line.length) found.push({ kind: 'text', text: line.slice(done) })
  return found
}

function toInline(match: RegExpMatchArray, depth: number): Inline {
  const { code, strong, emphasis, label, target, address, mention, ref } = match.groups ?? {}
  if (code !== undefined) return { kind: 'code', text: code }
  if (strong !== undefined) return { kind: 'strong', inside: within(strong, depth) }
  if (emphasis !== undefined) return { kind: 'emphasis', inside: within(emphasis, depth) }
  // The patterns let no scheme through but http, https and mailto.
  if (target !== undefined) return { kind: 'link', href: target, text: label ?? target }
  if (address !== undefined) return { kind: 'link', href: address, text: address }
  if (mention !== undefined) return { kind: 'mention', userId: mention }
  return { kind: 'ref', ref: ref ?? match[0] }
}

const within = (text: string, depth: number): Inline[] =>
  depth < 3 ? parseInline(text, depth + 1) : [{ kind: 'text', text }]
