/** The header that makes a browser keep an export as a file, named after the build (RFC 6266 and RFC 8187). */
export function exportName(buildName: string, ending = 'json'): string {
  const stem = tidy(buildName.replace(/[\p{Cc}/\\:*?"<>|]+/gu, ' ')) || 'build'
  const plain = tidy(stem.normalize('NFKD').replace(/[^\x20-\x7e]|%/g, '')) || 'build'
  return `attachment; filename="${plain}.${ending}"; filename*=UTF-8''${encodeExtended(`${stem}.${ending}`)}`
}

const tidy = (text: string): string => text.replace(/\s+/g, ' ').trim()

const encodeExtended = (text: string): string =>
  encodeURIComponent(text).replace(/['()*]/g, (sign) => `%${sign.charCodeAt(0).toString(16).toUpperCase()}`)
