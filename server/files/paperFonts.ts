import { fileURLToPath } from 'node:url'
import type { TFontDictionary } from 'pdfmake/interfaces.js'
import type { FontOf } from '#shared/paper/pageSvg.ts'

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

const fileOf = (script: Script, weight: number): string =>
  fileURLToPath(import.meta.resolve(`@fontsource/noto-sans/files/noto-sans-${script}-${weight}-normal.woff`))

/** Half-bold is a family of its own: a PDF library knows regular and bold only. */
const familyOf = (script: Script, weight: number): string => `Noto Sans ${script}${weight === 600 ? ' half' : ''}`

export const defaultFamily = familyOf('latin', 400)

/** Font files by family, as pdfmake wants them. */
export const paperFonts: TFontDictionary = Object.fromEntries(
  scriptNames.flatMap((script) => [
    [familyOf(script, 400), { normal: fileOf(script, 400), bold: fileOf(script, 700) }],
    [familyOf(script, 600), { normal: fileOf(script, 600), bold: fileOf(script, 600) }],
  ]),
)

/** The only files that the PDF library may read. */
export const paperFontFiles: ReadonlySet<string> = new Set(
  Object.values(paperFonts).flatMap((family) => Object.values(family).filter((file) => typeof file === 'string')),
)

/** What no shipped font has is set from the first one, which shows a box. */
export const fontOf: FontOf = (character, weight) => {
  const script = scriptNames.find((name) => scripts[name].test(character)) ?? 'latin'
  return { family: familyOf(script, weight), weight: weight === 700 ? 700 : 400 }
}
