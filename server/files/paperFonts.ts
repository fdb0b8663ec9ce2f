import { fileURLToPath } from 'node:url'
import type { TFontDictionary } from 'pdfmake/interfaces.js'
import type { Weight } from '#shared/paper/text/notoSans.ts'

/*
 * The font of the screen for PDFs. It comes in one file a script and weight; a text is set in as many of them as it needs.
 */

const scripts = {
  latin: /[\0-\u00ff\u0131\u0152\u0153\u02bb\u02bc\u02c6\u02da\u02dc\u2000-\u206f\u20ac\u2122\u2191\u2193\u2212\u2215]/,
  'latin-ext': /[\u0100-\u02ff\u1d00-\u1dbf\u1e00-\u1eff\u20a0-\u20c0\u2113]/,
  cyrillic: /[\u0400-\u045f\u0490\u0491\u04b0\u04b1\u2116]/,
  greek: /[\u0370-\u03ff]/,
} as const
type Script = keyof typeof scripts
const scriptNames = Object.keys(scripts) as Script[]

const files = new Map<string, string>()

function fileOf(script: Script, weight: Weight): string {
  const key = `${script}-${weight}`
  const known = files.get(key)
  if (known !== undefined) return known
  const file = fileURLToPath(import.meta.resolve(`@fontsource/noto-sans/files/noto-sans-${key}-normal.woff`))
  files.set(key, file)
  return file
}

export const defaultFamily = 'Noto Sans'

/** What the PDF library sets by itself. Every text of a page names its own file. */
export const paperFonts: TFontDictionary = {
  [defaultFamily]: { normal: fileOf('latin', 400), bold: fileOf('latin', 700) },
}

/** The only files that the PDF library may read. */
export const paperFontFiles: ReadonlySet<string> = new Set([fileOf('latin', 400), fileOf('latin', 700)])

/** A line of text in pieces that one font can set. What no shipped font has is set from the first, which shows a box. */
export function fontRuns(text: string, weight: Weight): { text: string; file: string }[] {
  const runs: { text: string; script: Script }[] = []
  for (const character of text) {
    const script = scriptNames.find((name) => scripts[name].test(character)) ?? 'latin'
    const last = runs.at(-1)
    if (last?.script === script) last.text += character
    else runs.push({ text: character, script })
  }
  return runs.map((run) => ({ text: run.text, file: fileOf(run.script, weight) }))
}
