/** What a spreadsheet takes for the beginning of a formula. */
const formula = /^[=+\-@\t\r]/

/**
 * A table as CSV (RFC 4180), with the byte order mark that spreadsheets need for letters beyond ASCII. Text that a
 * spreadsheet would run as a formula gets an apostrophe in front; numbers stay numbers.
 */
export function csvOf(rows: readonly (readonly (string | number | null)[])[]): string {
  return `\ufeff${rows.map((row) => row.map(cell).join(',')).join('\r\n')}\r\n`
}

function cell(value: string | number | null): string {
  if (value === null) return ''
  if (typeof value === 'number') return String(value)
  const text = formula.test(value) ? `'${value}` : value
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text
}
