/** A JSON value in a text that holds several, one after the other, with the line on which it begins. */
export type FoundValue = { line: number; value: unknown } | { line: number; trouble: string }

/** Values that never end are given up on after so many: each costs a look through the rest of the text. */
const mostUnended = 20

/**
 * Splits a text of JSON values that follow each other with nothing or anything between them, as pasted outputs of several
 * runs do (prompts and messages between them are passed over). What begins like a value and cannot be read is told
 * with its place; reading goes on at the next line that begins one.
 */
export function jsonValues(text: string): FoundValue[] {
  const found: FoundValue[] = []
  let unended = 0
  let line = 1
  let counted = 0
  for (let at = nextStart(text, 0); at >= 0 && unended < mostUnended;) {
    for (; counted < at; counted++) if (text[counted] === '\n') line++
    const end = endOfValue(text, at)
    const parsed = end < 0 ? undefined : parse(text.slice(at, end))
    if (parsed && 'value' in parsed) {
      found.push({ line, value: parsed.value })
      at = nextStart(text, end)
      continue
    }
    if (end < 0) unended++
    found.push({ line, trouble: end < 0 ? `it begins on line ${line} and never ends` : (parsed?.trouble ?? '') })
    at = nextStart(text, end < 0 ? afterLine(text, at) : end)
  }
  if (unended >= mostUnended)
    found.push({ line, trouble: `too many values begin and never end: nothing behind line ${line} was read` })
  return found
}

/** A value begins where a line begins with a bracket, or right behind another one. */
function nextStart(text: string, from: number): number {
  const start = /(?:^|\n|\}|\])[ \t\r]*[[{]/g
  start.lastIndex = Math.max(0, from - 1)
  const match = start.exec(text)
  return match ? match.index + match[0].length - 1 : -1
}

/** The end of the value that begins with the bracket at `from`; -1 where its brackets never close. Linear. */
function endOfValue(text: string, from: number): number {
  let depth = 0
  let inString = false
  for (let i = from; i < text.length; i++) {
    const sign = text[i]
    if (inString) {
      if (sign === '\\') i++
      else if (sign === '"') inString = false
    } else if (sign === '"') inString = true
    else if (sign === '{' || sign === '[') depth++
    else if ((sign === '}' || sign === ']') && --depth === 0) return i + 1
  }
  return -1
}

function parse(text: string): { value: unknown } | { trouble: string } {
  try {
    return { value: JSON.parse(text) as unknown }
  } catch (error) {
    return { trouble: error instanceof Error ? error.message : String(error) }
  }
}

function afterLine(text: string, at: number): number {
  const end = text.indexOf('\n', at)
  return end < 0 ? text.length : end + 1
}
