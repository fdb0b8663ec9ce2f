import { ref } from 'vue'
import type { ReviewState } from '#shared/contract/reviewState.ts'
import { approvalAt, approvalWords, checkedWords } from '#shared/review/words.ts'
import { useChecksStore } from '../stores/checks.ts'
import { useDiagramStore } from '../stores/diagram.ts'
import { useAttempt } from './useAttempt.ts'
import { fileName, saveFile } from './useFiles.ts'

/** Day in the reader's own time zone, as ISO 8601 writes it. */
export function isoDay(now: Date): string {
  const two = (value: number) => String(value).padStart(2, '0')
  return `${now.getFullYear()}-${two(now.getMonth() + 1)}-${two(now.getDate())}`
}

/** What the title block says of the review at a revision. */
export function reviewOf(review: ReviewState | null, revision: number): { checked: string; approval?: string } {
  const approval = approvalAt(review, revision)
  const checked = checkedWords(review, revision)
  return approval ? { checked, approval: approvalWords(approval) } : { checked }
}

/** "reel-vault-north-room-revision-14.png" */
export const pictureName = (build: string, revision: string, ending: string): string =>
  fileName(revision === '' ? `${build} wiring` : `${build} revision ${revision}`, ending)

/**
 * The whole diagram as a picture: one flat sheet drawn from the document, downloaded as SVG or as PNG. What draws it
 * is fetched when it is first asked for.
 */
export function useDiagramExport(revision: () => string = () => '', review: () => ReviewState | null = () => null) {
  const diagram = useDiagramStore()
  const checks = useChecksStore()
  const attempt = useAttempt()
  const isBusy = ref(false)

  async function draw(): Promise<string> {
    const { document, build, drawing, catalog } = diagram
    if (!document || !build || !drawing || !catalog) throw new Error('No build is open.')
    const [{ flatDiagram }, { check }, { fontCss }] = await Promise.all([
      import('#shared/paper/diagram/flat.ts'),
      import('#shared/check/check.ts'),
      import('../diagram/picture/fontCss.ts'),
    ])
    const result = checks.result && !checks.isPending ? checks.result : check(document, catalog)
    const moment = result.moments.find((one) => one.applies && one.moment === checks.moment)?.moment ?? 'cold-start'
    return flatDiagram({
      document,
      build,
      drawing,
      result,
      moment,
      revision: revision() || 'not saved',
      date: isoDay(new Date()),
      ...reviewOf(review(), Number(revision())),
      fontCss: await fontCss(),
    })
  }

  async function download(kind: 'picture' | 'drawing', make: () => Promise<void>): Promise<void> {
    if (isBusy.value) return
    isBusy.value = true
    await attempt(make, `The ${kind} was not made.`)
    isBusy.value = false
  }

  const nameOf = (ending: string) => pictureName(diagram.document?.name ?? '', revision(), ending)

  const exportSvg = () =>
    download('drawing', async () => saveFile(nameOf('svg'), await draw(), 'image/svg+xml;charset=utf-8'))

  const exportPng = () =>
    download('picture', async () => {
      const [svg, { rasterise }] = await Promise.all([draw(), import('../diagram/picture/rasterise.ts')])
      saveFile(nameOf('png'), await rasterise(svg), 'image/png')
    })

  return { exportSvg, exportPng, isBusy }
}
