import { ref } from 'vue'
import type { LidContent } from '#shared/paper/lid/content.ts'
import { csvOf } from '#shared/paper/csv.ts'
import type { Page } from '#shared/paper/page.ts'
import { pageSvg } from '#shared/paper/pageSvg.ts'
import { tableOf, type TableName } from '#shared/paper/lid/tables.ts'
import { lidSheetPdf } from '../../api/lidSheet.ts'
import { useAttempt } from '../../composables/useAttempt.ts'
import { isoDay } from '../../composables/useDiagramExport.ts'
import { asText, fileName, saveFile } from '../../composables/useFiles.ts'
import type { LidChoices } from './useLidOptions.ts'

/** Dots to the inch of a page as a picture, before the picture is drawn twice as fine. */
const dotsPerInch = 150

/** The lid sheet to take away, as files named after build and revision. */
export function useLidDownloads(buildId: string, build: () => { name: string; revision: number | string }) {
  const attempt = useAttempt()
  /** What is being made now, in words. */
  const making = ref('')
  let stop: AbortController | null = null

  const nameOf = (what: string, ending: string) => {
    const { name, revision } = build()
    return fileName(`${name} ${what} revision ${revision}`, ending)
  }

  async function make(words: string, act: (signal: AbortSignal) => Promise<void>): Promise<void> {
    if (making.value !== '') return
    const { signal } = (stop = new AbortController())
    making.value = words
    await attempt(async () => {
      try {
        await act(signal)
      } catch (error) {
        if (!signal.aborted) throw error
      }
    }, 'The file was not made.')
    making.value = ''
  }
  const cancel = () => stop?.abort()

  const pdf = (choices: LidChoices, address: string) =>
    make('the PDF', async (signal) => {
      const { revision } = build()
      const { seenFrom, ...rest } = choices
      const file = await lidSheetPdf(
        buildId,
        {
          ...rest,
          address,
          date: isoDay(new Date()),
          ...(typeof revision === 'number' && { revision }),
          ...(seenFrom !== 'case' && { seenFrom }),
        },
        signal,
      )
      saveFile(nameOf('lid sheet', 'pdf'), file)
    })

  /** A page with its typeface inside, so that it looks the same anywhere. */
  async function alone(page: Page, size: { width: string; height: string }): Promise<string> {
    const { fontCss } = await import('../../diagram/picture/fontCss.ts')
    const css = await fontCss()
    return pageSvg(page)
      .replace(/ width="[^"]*"/, ` width="${size.width}"`)
      .replace(/ height="[^"]*"/, ` height="${size.height}"`)
      .replace('>', () => `><style>${css}</style>`)
  }

  const svg = (page: Page, number: number) =>
    make('the drawing', async () => {
      const drawn = await alone(page, { width: `${page.width_mm}mm`, height: `${page.height_mm}mm` })
      saveFile(nameOf(`lid sheet page ${number}`, 'svg'), drawn, 'image/svg+xml;charset=utf-8')
    })

  const png = (page: Page, number: number) =>
    make('the picture', async (signal) => {
      const { rasterise } = await import('../../diagram/picture/rasterise.ts')
      const dots = (side_mm: number) => String(Math.round((side_mm / 25.4) * dotsPerInch))
      const drawn = await alone(page, { width: dots(page.width_mm), height: dots(page.height_mm) })
      const white = drawn.replace('</style>', '</style><rect width="100%" height="100%" fill="#ffffff"/>')
      const file = await rasterise(white)
      if (!signal.aborted) saveFile(nameOf(`lid sheet page ${number}`, 'png'), file, 'image/png')
    })

  const csv = (table: TableName, content: LidContent) =>
    saveFile(nameOf(table, 'csv'), csvOf(tableOf(table, content)), 'text/csv;charset=utf-8')

  const json = (content: LidContent) => saveFile(nameOf('lid sheet', 'json'), asText(content))

  return { making, cancel, pdf, svg, png, csv, json }
}
