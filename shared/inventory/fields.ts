/** A field deep in a value of unknown shape; undefined where any step is missing. */
export function at(value: unknown, ...path: readonly (string | number)[]): unknown {
  return path.reduce<unknown>(
    (inside, key) =>
      typeof inside === 'object' && inside !== null && Object.hasOwn(inside, key)
        ? (inside as Record<string | number, unknown>)[key]
        : undefined,
    value,
  )
}

/** A text without the blanks that drives pad their fields with; undefined where there is none. */
export function textOf(value: unknown, most = 80): string | undefined {
  const text =
    typeof value === 'string'
      ? value
          .replace(/\p{Cc}/gu, ' ')
          .trim()
          .replace(/\s+/g, ' ')
      : ''
  return text === '' ? undefined : text.slice(0, most)
}

/** A finite number, or text that is one. */
export function numberOf(value: unknown): number | undefined {
  if (typeof value === 'number') return Number.isFinite(value) ? value : undefined
  if (typeof value !== 'string' || !/^\s*\d+(\.\d+)?\s*$/.test(value)) return undefined
  return Number(value)
}

/** A world wide name as 16 or more hex digits in lower case; undefined for anything else. */
export function wwnOf(value: unknown): string | undefined {
  const digits =
    typeof value === 'string'
      ? value
          .trim()
          .toLowerCase()
          .replace(/^(0x|naa\.|eui\.)/, '')
      : ''
  return /^[0-9a-f]{16,32}$/.test(digits) && !/^0+$/.test(digits) ? digits : undefined
}

/** Drops what is undefined, so that "not said" and "absent" are one. */
export const known = <T extends object>(fields: { [K in keyof T]: T[K] | undefined }): T =>
  Object.fromEntries(Object.entries(fields).filter(([, value]) => value !== undefined)) as T
