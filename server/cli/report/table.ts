export interface Column {
  title: string
  align?: 'left' | 'right'
}

/** Width below which the first column is not squeezed. */
const narrowest = 16

/**
 * A table in plain text. The first column takes what the width leaves and is cut with an ellipsis; the others are as wide
 * as their longest cell.
 */
export function table(columns: readonly Column[], rows: readonly (readonly string[])[], width: number): string {
  const widths = columns.map(({ title }, i) => Math.max(title.length, ...rows.map((row) => row[i]?.length ?? 0)))
  const others = widths.slice(1).reduce((sum, one) => sum + one + 2, 0)
  widths[0] = Math.min(widths[0] ?? 0, Math.max(narrowest, width - others))
  const line = (cells: readonly string[]): string =>
    columns
      .map(({ align }, i) => {
        const cell = cut(cells[i] ?? '', widths[i] ?? 0)
        return align === 'right' ? cell.padStart(widths[i] ?? 0) : cell.padEnd(widths[i] ?? 0)
      })
      .join('  ')
      .trimEnd()
  return [line(columns.map((column) => column.title)), ...rows.map(line)].join('\n')
}

const cut = (text: string, width: number): string => (text.length <= width ? text : `${text.slice(0, width - 1)}…`)

/** Breaks text into lines between words, each after the indent. */
export function wrap(text: string, width: number, indent = ''): string {
  const room = Math.max(20, width - indent.length)
  const lines: string[] = []
  let current = ''
  for (const word of text.split(/\s+/)) {
    if (current !== '' && current.length + 1 + word.length > room) {
      lines.push(current)
      current = word
    } else current = current === '' ? word : `${current} ${word}`
  }
  return [...lines, current].map((line) => `${indent}${line}`).join('\n')
}
