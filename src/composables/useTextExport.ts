import { check } from '#shared/check/check.ts'
import { textSummary } from '#shared/paper/text.ts'
import { useChecksStore } from '../stores/checks.ts'
import { useDiagramStore } from '../stores/diagram.ts'
import { useAttempt } from './useAttempt.ts'
import { asText, fileName, saveFile } from './useFiles.ts'
import { useNotices } from './useNotices.ts'

/** The open build in plain text, for a forum or a ticket, and as the file that it can be made from again. */
export function useTextExport(revision: () => string) {
  const diagram = useDiagramStore()
  const checks = useChecksStore()
  const attempt = useAttempt()
  const { notify } = useNotices()

  const nameOf = (ending: string) => {
    const shown = revision()
    return fileName(`${diagram.document?.name ?? ''}${shown === '' ? '' : ` revision ${shown}`}`, ending)
  }

  function summary(): string {
    const { document, build, catalog } = diagram
    if (!document || !build || !catalog) throw new Error('No build is open.')
    return textSummary(build, checks.result && !checks.isPending ? checks.result : check(document, catalog))
  }

  const copyText = () =>
    attempt(async () => {
      await navigator.clipboard.writeText(summary())
      notify('Copied: paste it into a forum or a ticket.')
    }, 'The text was not copied.')

  const exportText = () =>
    attempt(async () => saveFile(nameOf('txt'), summary(), 'text/plain;charset=utf-8'), 'The text was not made.')

  const exportJson = () =>
    attempt(async () => saveFile(nameOf('json'), asText(diagram.document)), 'The file was not made.')

  return { copyText, exportText, exportJson }
}
