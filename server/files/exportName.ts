/** The header that makes a browser keep an export as a file, named after the build (RFC 6266 and RFC 8187). */
export function exportName(buildName: string): string {
  const name = `${buildName.replace(/[\p{Cc}/\\:*?"<>|]+/gu, ' ').trim() || 'build'}.json`
  const plain = name
    .normalize('NFKD')
    .replace(/[^\x20-\x7e]/g, '')
    .replace(/[%"\\]/g, '')
  return `attachment; filename="${plain}"; filename*=UTF-8''${encodeExtended(name)}`
}

const encodeExtended = (text: string): string =>
  encodeURIComponent(text).replace(/['()*]/g, (sign) => `%${sign.charCodeAt(0).toString(16).toUpperCase()}`)
