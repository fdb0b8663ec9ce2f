/** Hands a file to the person, as a download. */
export function saveFile(name: string, content: string | Blob, type = 'application/json'): void {
  const url = URL.createObjectURL(typeof content === 'string' ? new Blob([content], { type }) : content)
  const link = document.createElement('a')
  link.href = url
  link.download = name
  link.click()
  URL.revokeObjectURL(url)
}

/** A name that every file system takes. */
export const fileName = (name: string, ending: string): string => {
  const plain = name
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .replace(/[^\w.-]+/g, '-')
    .replace(/^[-.]+|[-.]+$/g, '')
  return `${(plain || 'bayloom').toLowerCase().slice(0, 80)}.${ending}`
}

/** JSON as people read it. */
export const asText = (value: unknown): string => `${JSON.stringify(value, null, 2)}\n`

export type JsonRead = { ok: true; value: unknown } | { ok: false; reason: string }

/** Reads a file as JSON; says why not, in words. */
export async function readJsonFile(file: File, most_B = 4_000_000): Promise<JsonRead> {
  if (file.size > most_B) return { ok: false, reason: `The file is larger than ${most_B / 1_000_000} MB.` }
  try {
    return { ok: true, value: JSON.parse(await file.text()) }
  } catch (error) {
    return { ok: false, reason: `The file is not JSON: ${error instanceof Error ? error.message : 'unreadable'}` }
  }
}
