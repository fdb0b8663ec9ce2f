import plainUrl from '@fontsource/noto-sans/files/noto-sans-latin-400-normal.woff2?url'
import strongUrl from '@fontsource/noto-sans/files/noto-sans-latin-600-normal.woff2?url'
import boldUrl from '@fontsource/noto-sans/files/noto-sans-latin-700-normal.woff2?url'

const faces = [
  { weight: 400, url: plainUrl },
  { weight: 600, url: strongUrl },
  { weight: 700, url: boldUrl },
] as const

async function asDataUrl(url: string): Promise<string> {
  const response = await fetch(url)
  if (!response.ok) throw new Error(`The typeface could not be fetched (${response.status}).`)
  const blob = await response.blob()
  return new Promise((done, fail) => {
    const reader = new FileReader()
    reader.onload = () => done(String(reader.result))
    reader.onerror = () => fail(reader.error ?? new Error('The typeface could not be read.'))
    reader.readAsDataURL(blob)
  })
}

let made: Promise<string> | null = null

/** `@font-face` rules that carry the screen's Noto Sans inside, so that a picture looks the same anywhere. Made once. */
export function fontCss(): Promise<string> {
  made ??= Promise.all(
    faces.map(
      async ({ weight, url }) =>
        `@font-face{font-family:'Noto Sans';font-weight:${weight};src:url(${await asDataUrl(url)}) format('woff2')}`,
    ),
  ).then((rules) => rules.join(''))
  made.catch(() => (made = null))
  return made
}
